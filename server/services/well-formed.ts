/** Halves of a pair of characters, which canonical JSON cannot hold, become the sign for an unreadable one. */
export const wellFormed = (text: string): string => text.replaceAll(/\p{Cs}/gu, '\ufffd');
