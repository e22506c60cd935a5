/** Limits that client and server share; each with its unit and its reason. */

/** Bytes of one uploaded file. A 600-dpi colour sheet in PDF stays below it. */
export const MAX_UPLOAD_BYTES = 250 * 1024 * 1024;
/** Base-raster pixels a place may lie from the sheet's corner; the longest page at 600 dpi has some 100,000. */
export const MAX_SHEET_PX = 1e6;
/** Greatest offset, elevation, head or count of a document, in any unit: no section is ten thousand kilometres long. */
export const MAX_FIGURE = 1e7;
/** Greatest permeability, in any unit; the loosest rockfill has some 1e9 ft/year. */
export const MAX_PERMEABILITY = 1e12;
/** Bytes of a net file: 60 lines of 1,000 vertices take 4 MB with every number on a line of its own. */
export const MAX_NET_FILE_BYTES = 6 * 1024 * 1024;
/** Operations in one batch of commands; a longer queue is sent in several. */
export const MAX_OPS_PER_BATCH = 500;
/** Characters of one note or answer. */
export const MAX_NOTE_LENGTH = 4000;
/** Files of one note or answer; a walk along a dam gives some ten photographs. */
export const MAX_NOTE_FILES = 12;
/** Bytes of one file of a note: several photographs of a large sensor, or a report of some hundred pages. */
export const MAX_NOTE_FILE_BYTES = 50 * 1024 * 1024;
/** Minutes in which an author may change what a note or an answer says; later, an answer says it better. */
export const NOTE_EDIT_MINUTES = 15;
/** Reasons given with one sending: a schedule of a thousand points with a question at each stays below it. */
export const MAX_OPEN_REASONS = 5000;
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
/** Pixels of one scanned page: an A0 sheet at 600 dpi has 558 million. */
export const MAX_PIXELS = 600_000_000;
/** Pixels a PDF page is drawn to: an A0 sheet at 300 dpi has 139.5 million. */
export const MAX_PDF_PIXELS = 140_000_000;
/** Pages of one file; a bound set of drawings stays below it. */
export const MAX_PAGES = 300;
/** Dots per inch a PDF page is drawn at when no scan in it is finer; keeps a 0.13 mm line at 1.5 pixels. */
export const DEFAULT_DPI = 300;
/** Dots per inch below which a pen's line is no longer a pixel wide. */
export const MIN_DPI = 150;
/** Pixels along one side of a page that is drawn. */
export const MAX_DRAWN_SIDE_PX = 32_000;
/** Dots per inch above which more show nothing that a pen drew. */
export const MAX_DPI = 600;
/** Seconds one page may take to render. */
export const RENDER_SECONDS = 180;
/** Resident bytes the rendering process may hold; an A1 sheet at 300 dpi needs just under 1 GB from a PDF. */
export const RENDER_MEMORY_BYTES = 1_200_000_000;
/** Longer side of a thumbnail in pixels. */
export const THUMBNAIL_PX = 480;
/** Pixels of the largest dark speck that can be taken out of a scan: a full stop of a 600 dpi scan has more. */
export const MAX_SPECK_PX = 60;

/** Places by which one sheet may be matched to another. */
export const MAX_MATCHED_PLACES = 50;
