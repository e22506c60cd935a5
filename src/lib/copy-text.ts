/**
 * Puts a text on the clipboard; false when the browser did not let it. On an address that is not secure there is no
 * clipboard to write to, only the old way of copying what is selected.
 */
export async function copyText(text: string): Promise<boolean> {
  try {
    await navigator.clipboard.writeText(text);
    return true;
  } catch {
    return copySelected(text);
  }
}

function copySelected(text: string): boolean {
  const holder = document.createElement('textarea');
  holder.value = text;
  holder.setAttribute('readonly', '');
  Object.assign(holder.style, { position: 'fixed', opacity: '0' });
  const focused = document.activeElement;
  document.body.append(holder);
  holder.select();
  const copied = document.execCommand('copy');
  holder.remove();
  if (focused instanceof HTMLElement) focused.focus();
  return copied;
}
