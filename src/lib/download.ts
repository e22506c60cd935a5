/** Lets the browser download what an address of the API answers as an attachment, without leaving the page. */
export function downloadFrom(url: string): void {
  const link = document.createElement('a');
  link.href = url;
  link.download = '';
  link.click();
}

/** Lets the browser keep a text made on the page as a file. */
export function downloadText(text: string, fileName: string, mediaType: string): void {
  const url = URL.createObjectURL(new Blob([text], { type: mediaType }));
  const link = document.createElement('a');
  link.href = url;
  link.download = fileName;
  link.click();
  URL.revokeObjectURL(url);
}

/** Lets the browser keep a file made on the page. */
export function downloadBlob(blob: Blob, fileName: string): void {
  const url = URL.createObjectURL(blob);
  const link = document.createElement('a');
  link.href = url;
  link.download = fileName;
  link.click();
  // The browser reads it after the click; a large one not at once.
  setTimeout(() => URL.revokeObjectURL(url), 60_000);
}
