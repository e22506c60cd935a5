/**
 * pdf.js tells of pictures it could not decode only by a warning on the console, and then goes on as if the page
 * were whole. In the rendering process the console is therefore collected instead of printed.
 */
const KEPT = 200;

let warnings: string[] = [];

export function collectConsole(): void {
  const collect = (...parts: unknown[]) => {
    if (warnings.length < KEPT) warnings.push(parts.map(String).join(' ').slice(0, 500));
  };
  for (const level of ['log', 'info', 'warn', 'error', 'debug'] as const) console[level] = collect;
}

/** The warnings since the last call. */
export function takeWarnings(): string[] {
  const taken = warnings;
  warnings = [];
  return taken;
}

const ABOUT_PICTURES = /image|jpeg|jpx|jbig2|ccitt|dct/i;

// Repairs that leave the picture whole: sizes taken from the data, a wrong marker skipped and parsed again.
const HARMLESS = [
  /using the Width\/Height of/,
  /attempting to re-parse the JPEG image/,
  /searching for \/EI\/ instead/,
  /OffscreenCanvas is not supported/,
];

/** The first warning that tells of a picture shown wrongly or not at all. */
export function pictureWarning(messages: string[]): string | undefined {
  return messages.find((text) => ABOUT_PICTURES.test(text) && !HARMLESS.some((known) => known.test(text)));
}

export function isTooLargePicture(message: string): boolean {
  return message.includes('Image exceeded maximum allowed size');
}
