/** Limits that client and server share; each with its unit and its reason. */

/** Bytes of one uploaded file. A 600-dpi colour sheet in PDF stays below it. */
export const MAX_UPLOAD_BYTES = 250 * 1024 * 1024;
/** Operations in one batch of commands; a longer queue is sent in several. */
export const MAX_OPS_PER_BATCH = 500;
/** Characters of one note or answer. */
export const MAX_NOTE_LENGTH = 4000;
/** Characters a password needs at least (NIST SP 800-63B asks for 8; an office tool can ask for more). */
export const MIN_PASSWORD_LENGTH = 10;
/** Characters a password may have, so that hashing stays bounded. */
export const MAX_PASSWORD_LENGTH = 200;
/** Items of one page of a list. */
export const PAGE_SIZE = 50;
/** Milliseconds after which a change on the desk is sent. */
export const AUTOSAVE_MS = 1000;
/** Side of a tile in pixels. */
export const TILE_SIZE_PX = 512;
