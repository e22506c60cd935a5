/** The name that a net file gives its net, to propose it; empty when the file is none. */
export function nameInFile(content: string): string {
  try {
    const json: unknown = JSON.parse(content.replace(/^\uFEFF/, ''));
    const name = typeof json === 'object' && json !== null && 'name' in json ? json.name : '';
    return typeof name === 'string' ? name.trim() : '';
  } catch {
    return '';
  }
}
