/** Ids of what the seed makes are fixed (in the form of a UUIDv7), so that a seed cut off half way goes on where it stopped. */
export const demoId = (number: number): string =>
  `019a3c00-0000-7000-8000-${number.toString(16).padStart(12, '0')}`;
