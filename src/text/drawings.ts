import { fixedText, plainText } from '#client/lib/figures.ts';
import type { DrawingDto, NetSummary, RenderJobDto } from '#shared/contract/drawings.ts';
import { inLanguage } from './language.ts';

const plural = (count: number, one: string, many: string) => `${count} ${count === 1 ? one : many}`;
const MB = 1024 * 1024;

const enFacts = {
  revision: (number: string, revision: string) => `${number} rev ${revision}`,
  stages: { asBuilt: 'as-built', design: 'design' },
  sheets: (count: number) => plural(count, 'sheet', 'sheets'),
  dpi: (dpi: number) => `${Math.round(dpi)} dpi`,
  bytes: (bytes: number) => `${bytes} bytes`,
  kilobytes: (count: number) => `${count} kB`,
  megabytes: (figure: string) => `${figure} MB`,
  states: { sent: 'sent for checking', accepted: 'accepted', returned: 'returned' },
  /** Stands behind one of the states. */
  changedSince: ', changed since',
  notFinished: 'not finished',
  traced: 'traced',
  waiting: 'Waiting to be prepared for the desk',
  reading: 'Reading the file',
  preparing: (page: number, of: number) => `Preparing page ${page} of ${of}`,
} as const;
const facts = inLanguage({ en: enFacts });

/** "HF-114 rev C", or the file's name until the drawing has a number. */
export function drawingName(drawing: Pick<DrawingDto, 'number' | 'revision' | 'fileName'>): string {
  if (!drawing.number) return drawing.fileName;
  return drawing.revision ? facts.revision(drawing.number, drawing.revision) : drawing.number;
}

/** "Cross-sections, as-built 1961. 2 sheets, 300 dpi". */
export function drawingFacts(drawing: DrawingDto): string {
  const { stage } = drawing;
  const stageWord = stage === 'asBuilt' || stage === 'design' ? facts.stages[stage] : '';
  const what = [drawing.title, [stageWord, drawing.drawnOn].filter(Boolean).join(' ')]
    .filter(Boolean)
    .join(', ');
  const dpi = drawing.sheets[0]?.dpi;
  const sheets = drawing.sheets.length;
  const how = [sheets > 0 ? facts.sheets(sheets) : '', dpi ? facts.dpi(dpi) : ''].filter(Boolean).join(', ');
  return [what, how].filter(Boolean).join('. ');
}

/** "2.4 MB"; a whole megabyte is 1,048,576 bytes, as the limit counts. */
export function byteText(bytes: number): string {
  if (bytes < 1024) return facts.bytes(bytes);
  return bytes < MB ? facts.kilobytes(Math.ceil(bytes / 1024)) : facts.megabytes(fixedText(bytes / MB, 1));
}

/** Where the work on a net stands, in a few words; what was changed since is not what was sent or decided on. */
export function netStateText(net: NetSummary): string {
  const since = net.changedSinceRevision ? facts.changedSince : '';
  if (net.state === 'sent') return `${facts.states.sent}${since}`;
  if (net.state === 'accepted' || net.state === 'returned') {
    return `${[facts.states[net.state], net.revisionLabel].filter(Boolean).join(' ')}${since}`;
  }
  return net.drops === null ? facts.notFinished : facts.traced;
}

export function jobText(job: RenderJobDto): string {
  if (job.state === 'waiting') return facts.waiting;
  if (job.pagesTotal === null) return facts.reading;
  return facts.preparing(Math.min(job.pagesDone + 1, job.pagesTotal), job.pagesTotal);
}

const en = {
  title: 'Drawings',
  add: 'Add a drawing',
  photo: 'Take a photo',
  dropHint: 'Drop a scan or PDF here, or paste a picture. TIFF, PDF, JPEG, PNG or WebP, up to 250 MB.',
  dropHere: (dam: string) => `Drop the files to add them to ${dam}`,
  none: 'No drawing yet. Add a scan or a PDF: it is kept as it is, and its pages become sheets to trace on.',
  noneReader: 'No drawing yet. An engineer of this dam adds them.',
  nonePutAway: 'No drawing has been put away.',
  putAwayMark: 'put away',
  showPutAway: 'Show what was put away',
  hidePutAway: 'Show what is in use',
  thumbnailOf: (name: string) => `First sheet of ${name}`,
  noSection: 'No section framed yet',
  needsKnownPoints: 'Known points needed',
  toScale: 'To scale, not traced',
  dropsOf: (count: number) => `${plainText(count)} drops`,
  notesUnread: (count: number) => `${plainText(count)} new to you`,
  notesOpen: (count: number) => plural(count, 'note open', 'notes open'),
  notRendered: 'This file could not be used.',
  prepareAgain: 'Prepare again',
  prepareAgainHint: 'Tries the same file once more. Worth it after the product was updated.',
  preparingAgain: 'The file is read again.',

  uploads: 'Files on their way',
  uploadWaiting: 'Waiting',
  uploadSending: (sent: string, all: string) => `${sent} of ${all} sent`,
  uploadChecking: 'Sent, being checked',
  uploadDone: 'Added',
  uploadProgress: (name: string) => `${name}, sent`,
  cancel: 'Cancel',
  cancelUpload: (name: string) => `Cancel ${name}`,
  tryAgain: 'Try again',
  tryAgainWith: (name: string) => `Try again with ${name}`,
  dismiss: 'Close',
  dismissUpload: (name: string) => `Close the line of ${name}`,
  sameFile: (name: string) => `This dam already holds the same file as ${name}.`,
  openIt: 'Open that drawing',
  keepSecond: 'Keep as a second drawing',
  emptyFile: 'The file is empty: nothing was stored in it. Copy it again from where it came, then add it.',
  tooLarge: (size: string) =>
    `The file has ${size}; up to 250 MB are taken. Scan at a lower resolution, or split the file.`,
  leaveWarning: 'Files are still on their way.',
  pastedName: (stamp: string, extension: string) => `Pasted ${stamp}.${extension}`,

  drawing: 'Drawing',
  drawingLead: (who: string, when: string) => `Added by ${who}, ${when}`,
  sheets: 'Sheets',
  sheet: (page: number) => `Sheet ${page}`,
  choosePage: 'Pages of this file',
  sheetSize: (width: number, height: number, dpi: number | null) =>
    `${width} × ${height} px${dpi ? `, ${Math.round(dpi)} dpi` : ''}`,
  noSheets: 'No sheet could be made of this file.',
  pictureOf: (name: string, page: number) => `${name}, sheet ${page}`,

  fields: 'Title of the drawing',
  number: 'Drawing number',
  drawingTitle: 'Title',
  revision: 'Revision',
  drawnOn: 'Date on the drawing',
  drawnOnHint: 'As written; often only a year.',
  stage: 'As-built or design',
  stageUnknown: 'not known',
  asBuilt: 'as-built',
  design: 'design',
  source: 'Source',
  sourceHint: 'Archive, box, roll, who scanned it.',
  saveFields: 'Save the title',
  fieldsSaved: 'The title is saved.',

  original: 'Original file',
  download: 'Download the original',
  fileName: 'File',
  fileSize: 'Size',
  sha256: 'SHA-256',
  originalLead: 'Kept byte for byte as it was uploaded.',

  sections: 'Sections',
  noSections: 'No section framed yet. Draw a frame around the cross-section to be read, and name it.',
  noSectionsReader: 'No section framed yet. An engineer of this dam frames it.',
  newSection: 'New section',
  newSectionLead: 'Drag a frame around the section on the sheet, or take the whole sheet.',
  editSection: 'Change',
  editSectionOf: (label: string) => `Change ${label}`,
  sectionName: 'Section',
  sectionNameHint: 'Its letter or name: B–B, Spillway axis.',
  chainage: 'Cut at chainage',
  chainageHint: 'As written on the drawing: 212, 0+212, axis.',
  frame: 'Frame on the sheet',
  wholeSheet: 'Whole sheet',
  wholeSheetChosen: 'The whole sheet is taken.',
  frameSize: (width: number, height: number) => `Frame of ${width} × ${height} px.`,
  frameTyped: 'Type the frame',
  left: 'Left, px',
  top: 'Top, px',
  width: 'Width, px',
  height: 'Height, px',
  makeSection: 'Make the section',
  sectionMade: 'The section is made. Set its known points on the desk.',
  sectionSaved: 'The section is saved.',
  calibrated: 'to scale',
  notCalibrated: 'known points needed',

  nets: 'Nets',
  newNet: 'New net',
  newNetOf: (label: string) => `New net for ${label}`,
  newNetLead: 'One net for each load case.',
  loadCase: 'Load case',
  loadCaseHint: 'Full supply, flood 119.40, drawn by the designer …',
  defaultLoadCase: 'Full supply',
  makeNet: 'Make the net and open the desk',
  openDesk: 'Open the desk',
  copyNet: 'Copy for another load case',
  copyNetOf: (name: string) => `Copy ${name} for another load case`,
  copyLead: 'Water levels, lines and reading points are copied; the known points are shared.',
  copyName: (name: string) => `${name}, copy`,
  makeCopy: 'Make the copy',
  copied: 'The copy is made.',
  renameNet: 'Rename',
  renameNetOf: (name: string) => `Rename ${name}`,
  saveName: 'Save the name',

  putAway: 'Put away',
  bringBack: 'Bring back',
  putAwayOf: (name: string) => `Put away ${name}`,
  bringBackOf: (name: string) => `Bring back ${name}`,
  putAwayDone: (name: string) => `${name} is put away. It can be brought back.`,
  broughtBack: (name: string) => `${name} is back.`,
  drawingIsPutAway: 'This drawing was put away. It can be read, not changed.',
  showPutAwayHere: 'Show put-away sections and nets',
  more: (name: string) => `More for ${name}`,
} as const;
export const drawingsText = inLanguage({ en });
