/** "Section B–B" for a section that is named by its letter; a name that says more stands alone: "Spillway axis". */
export function sectionTitle(name: string): string {
  return /^[A-Z0-9]{1,3}(\s*[–-]\s*[A-Z0-9]{1,3}[′']?)?$/i.test(name) ? `Section ${name}` : name;
}

/** "Section B–B, chainage 212"; a chainage in words stands alone, and is left out where the name says it already. */
export function sectionLabel({ name, chainage }: { name: string; chainage: string }): string {
  const place = /^[0-9+.,\s]+$/.test(chainage) ? `chainage ${chainage}` : chainage;
  const saysSo = name.toLowerCase().includes(chainage.toLowerCase());
  return [sectionTitle(name), saysSo ? '' : place].filter(Boolean).join(', ');
}
