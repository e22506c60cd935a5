import type { MailKind } from '#shared/contract/mails.ts';

/** What a template makes: the same letter for clients that show HTML and for those that do not. */
export interface Letter {
  kind: MailKind;
  subject: string;
  text: string;
  html: string;
  /** What a digest says of it below its subject, and where it leads. */
  brief: string;
  link: string;
}

/** A table of figures: one head for each column, units in the head, rows of finished text. */
export interface Figures {
  heads: string[];
  rows: string[][];
}

/** One of several things that a letter tells of. */
export interface LetterItem {
  title: string;
  text: string;
  url: string;
}

export interface LetterParts {
  kind: MailKind;
  subject: string;
  paragraphs: string[];
  /** Whether a picture is put in when the letter is sent. */
  hasPicture?: boolean;
  /** Named facts, one a line. */
  facts?: Array<[name: string, value: string]>;
  figures?: Figures | null;
  items?: LetterItem[];
  /** The one link of the letter. */
  link: { label: string; url: string };
  /** Said small, below the link. */
  closing: string;
}

const ESCAPES: Record<string, string> = {
  '&': '&amp;',
  '<': '&lt;',
  '>': '&gt;',
  '"': '&quot;',
  "'": '&#39;',
};
export const escapeHtml = (text: string) => text.replace(/[&<>"']/g, (mark) => ESCAPES[mark] ?? mark);

/** A subject is one line whatever a name contains. */
const oneLine = (text: string) => text.replace(/\s+/g, ' ').trim();

/**
 * Stands in the HTML where a picture belongs. The picture is made when the letter is sent, and may be missing then. What
 * people type is escaped and cannot contain it.
 */
const PICTURE_PLACE = '<!--picture-->';

/** A picture in a letter, which comes with it as a part of its own. */
export interface LetterPicture {
  /** Where its bytes are: `cid:…` in a mail. */
  source: string;
  alt: string;
  widthPx: number;
}

/** The HTML with the picture in its place, or as if there had never been one. */
export function withPicture(html: string, picture: LetterPicture | null): string {
  return html.replace(PICTURE_PLACE, () => (picture ? pictureHtml(picture) : ''));
}

const pictureHtml = ({ source, alt, widthPx }: LetterPicture) =>
  `<p><img src="${escapeHtml(source)}" alt="${escapeHtml(alt)}" width="${widthPx}" style="max-width:100%;height:auto;border:1px solid #b9c3c2"></p>`;

/** Lays a letter out. Nothing in it is fetched from anywhere, and it stays readable without any styles. */
export function layOut(parts: LetterParts): Letter {
  const { kind, paragraphs, link } = parts;
  const subject = oneLine(parts.subject);
  return {
    kind,
    subject,
    text: asText(parts),
    html: asHtml(parts),
    brief: paragraphs.join('\n'),
    link: link.url,
  };
}

function asText({ paragraphs, facts = [], figures, items = [], link, closing }: LetterParts): string {
  const blocks = [...paragraphs];
  items.forEach(({ title, text, url }, i) => {
    blocks.push([`${i + 1}. ${title}`, text, url].filter(Boolean).join('\n'));
  });
  if (facts.length > 0) blocks.push(facts.map(([name, value]) => `${name}: ${value}`).join('\n'));
  if (figures && figures.rows.length > 0) blocks.push(textTable(figures));
  blocks.push(`${link.label}:\n${link.url}`, closing, '-- \nTracehead');
  return `${blocks.join('\n\n')}\n`;
}

/** Characters of a line beyond which plain clients break it, and with it the table. */
const WIDEST = 76;

/** Columns padded to one width; the first reads from the left, figures are set to the right. */
function textTable({ heads, rows }: Figures): string {
  const inOneLine = setInColumns([heads], rows);
  if (inOneLine.indexOf('\n') <= WIDEST) return inOneLine;
  return setInColumns(stacked(heads), rows);
}

/** Heads that are too long beside one another, with the unit below the name. */
function stacked(heads: readonly string[]): string[][] {
  const parts = heads.map((head) => head.split(', '));
  const deepest = Math.max(...parts.map((each) => each.length));
  return Array.from({ length: deepest }, (_, i) => parts.map((each) => each[i] ?? ''));
}

function setInColumns(heads: readonly string[][], rows: readonly string[][]): string {
  const all = [...heads, ...rows];
  const columns = heads[0]?.length ?? 0;
  const widths = Array.from({ length: columns }, (_, n) =>
    Math.max(...all.map((row) => (row[n] ?? '').length)),
  );
  const line = (cells: string[]) =>
    widths
      .map((width, n) => (n === 0 ? (cells[n] ?? '').padEnd(width) : (cells[n] ?? '').padStart(width)))
      .join('  ')
      .trimEnd();
  return all.map(line).join('\n');
}

const BODY = 'font-family:Arial,Helvetica,sans-serif;font-size:15px;line-height:1.5;color:#1c2733';
const RULE = 'border-bottom:1px solid #b9c3c2;padding:4px 12px 4px 0;vertical-align:top';
/** A hash has no place to break at, and would make the letter wider than a telephone. */
const BREAKS = 'word-break:break-word;overflow-wrap:anywhere';
/** A figure and its ± stay on one line. */
const held = (figure: string) => figure.replaceAll(' ± ', '\u00a0±\u00a0');

function asHtml(parts: LetterParts): string {
  const { subject, paragraphs, facts = [], figures, items = [], link, closing } = parts;
  const rows = facts.map(factHtml).join('');
  return [
    `<!doctype html><html lang="en"><head><meta charset="utf-8"><title>${escapeHtml(oneLine(subject))}</title></head>`,
    `<body style="${BODY}">`,
    ...paragraphs.map((text) => `<p>${lines(text)}</p>`),
    ...items.map(itemHtml),
    parts.hasPicture ? PICTURE_PLACE : '',
    rows && `<table style="border-collapse:collapse;font-size:14px">${rows}</table>`,
    figures && figures.rows.length > 0 ? htmlTable(figures) : '',
    `<p><a href="${escapeHtml(link.url)}">${escapeHtml(link.label)}</a></p>`,
    `<p style="font-size:13px;color:#52606b">${escapeHtml(closing)}</p>`,
    '</body></html>',
  ].join('\n');
}

const lines = (text: string) => escapeHtml(text).replaceAll('\n', '<br>');

const itemHtml = ({ title, text, url }: LetterItem) =>
  `<p style="border-top:1px solid #b9c3c2;padding-top:8px"><a href="${escapeHtml(url)}">${escapeHtml(title)}</a><br>${lines(text)}</p>`;

const factHtml = ([name, value]: [string, string]) =>
  `<tr><td style="${RULE};white-space:nowrap">${escapeHtml(name)}</td><td style="${RULE};${BREAKS}">${escapeHtml(value)}</td></tr>`;

function htmlTable({ heads, rows }: Figures): string {
  const align = (n: number) => (n === 0 ? 'left' : 'right');
  return `<table style="border-collapse:collapse;margin-top:12px;font-size:14px">${row(heads, 'th', align)}${rows
    .map((cells) => row(cells, 'td', align))
    .join('')}</table>`;
}

const row = (cells: string[], tag: 'td' | 'th', align: (n: number) => string) =>
  `<tr>${cells
    .map((cell, n) => `<${tag} style="${RULE};text-align:${align(n)}">${escapeHtml(held(cell))}</${tag}>`)
    .join('')}</tr>`;
