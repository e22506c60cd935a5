const LONGEST = 200;

/**
 * An uploader's file name as a plain text to show and to offer when downloading, never to be used as a path: the
 * part after the last slash or backslash, without control characters, marks that turn the writing direction, and
 * halves of a surrogate pair; "unnamed" when nothing is left.
 */
export function cleanFileName(given: string): string {
  const last = given.split(/[\\/]/).at(-1) ?? '';
  const visible = last
    .replace(/[\p{Cc}\p{Cs}\u200e\u200f\u202a-\u202e\u2066-\u2069\ufeff\ufffd]/gu, '')
    .trim();
  const name = shortened(visible);
  return /^\.*$/.test(name) ? 'unnamed' : name;
}

/** Keeps the ending, by which the person's own programs know what to do with the file. */
function shortened(name: string): string {
  const characters = [...name];
  if (characters.length <= LONGEST) return name;
  const ending = /\.[^.]{1,10}$/.exec(name)?.[0] ?? '';
  return characters.slice(0, LONGEST - ending.length).join('') + ending;
}
