/** What a template makes: the same letter for clients that show HTML and for those that do not. */
export interface Letter {
  subject: string;
  text: string;
  html: string;
}

/** A table of figures: one head for each column, units in the head, rows of finished text. */
export interface Figures {
  heads: string[];
  rows: string[][];
}

export interface LetterParts {
  subject: string;
  paragraphs: string[];
  /** Named facts, one a line. */
  facts?: Array<[name: string, value: string]>;
  figures?: Figures | null;
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

/** Lays a letter out. Nothing in it is fetched from anywhere, and it stays readable without any styles. */
export function layOut(parts: LetterParts): Letter {
  return { subject: oneLine(parts.subject), text: asText(parts), html: asHtml(parts) };
}

function asText({ paragraphs, facts = [], figures, link, closing }: LetterParts): string {
  const blocks = [...paragraphs];
  if (facts.length > 0) blocks.push(facts.map(([name, value]) => `${name}: ${value}`).join('\n'));
  if (figures && figures.rows.length > 0) blocks.push(textTable(figures));
  blocks.push(`${link.label}:\n${link.url}`, closing, '-- \nTracehead');
  return `${blocks.join('\n\n')}\n`;
}

/** Columns padded to one width; the first reads from the left, figures are set to the right. */
function textTable({ heads, rows }: Figures): string {
  const widths = heads.map((head, n) => Math.max(head.length, ...rows.map((row) => (row[n] ?? '').length)));
  const line = (cells: string[]) =>
    widths
      .map((width, n) => (n === 0 ? (cells[n] ?? '').padEnd(width) : (cells[n] ?? '').padStart(width)))
      .join('  ')
      .trimEnd();
  return [heads, ...rows].map(line).join('\n');
}

const BODY = 'font-family:Arial,Helvetica,sans-serif;font-size:15px;line-height:1.5;color:#1c2733';
const RULE = 'border-bottom:1px solid #b9c3c2;padding:4px 12px 4px 0';

function asHtml({ subject, paragraphs, facts = [], figures, link, closing }: LetterParts): string {
  const rows = facts.map(([name, value]) => row([name, value], 'td', () => 'left')).join('');
  return [
    `<!doctype html><html lang="en"><head><meta charset="utf-8"><title>${escapeHtml(oneLine(subject))}</title></head>`,
    `<body style="${BODY}">`,
    ...paragraphs.map((text) => `<p>${escapeHtml(text).replaceAll('\n', '<br>')}</p>`),
    rows && `<table style="border-collapse:collapse">${rows}</table>`,
    figures && figures.rows.length > 0 ? htmlTable(figures) : '',
    `<p><a href="${escapeHtml(link.url)}">${escapeHtml(link.label)}</a></p>`,
    `<p style="font-size:13px;color:#52606b">${escapeHtml(closing)}</p>`,
    '</body></html>',
  ].join('\n');
}

function htmlTable({ heads, rows }: Figures): string {
  const align = (n: number) => (n === 0 ? 'left' : 'right');
  return `<table style="border-collapse:collapse;margin-top:12px">${row(heads, 'th', align)}${rows
    .map((cells) => row(cells, 'td', align))
    .join('')}</table>`;
}

const row = (cells: string[], tag: 'td' | 'th', align: (n: number) => string) =>
  `<tr>${cells
    .map((cell, n) => `<${tag} style="${RULE};text-align:${align(n)}">${escapeHtml(cell)}</${tag}>`)
    .join('')}</tr>`;
