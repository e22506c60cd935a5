import { inLanguage } from './language.ts';

/** Words of the switch between a sheet's cleaned-up picture and its scan, on the desk. */
const enDesk = {
  picture: 'The sheet is shown',
  cleaned: 'Cleaned up',
  cleanedTitle: 'The cleaned-up picture of this sheet; the traces stay where they are',
  original: 'Scan',
  originalTitle: 'The sheet as it was scanned; the traces stay where they are',
} as const;
export const deskPictureText = inLanguage({ en: enDesk });

const en = {
  cleanUp: 'Clean up',
  title: (page: number) => `Clean up sheet ${page}`,
  lead: 'Makes another picture of the sheet to trace on. The scan is kept as it is, and traces stay on their lines.',
  back: 'Back to the sections',
  loading: 'Loading the sheet',
  loadFailed: 'The sheet could not be loaded. Reload the page.',
  picture: (page: number) => `Sheet ${page} as it would become`,
  pictureOfScan: (page: number) => `Sheet ${page} as it was scanned`,
  use: 'Use this picture',
  asked: 'The picture is being made. The sheet is shown by it as soon as it is ready.',
  reset: 'Reset',
  compare: 'Compare with the scan',
  nothingSet: 'Nothing is changed yet.',
  noPicture: 'These settings leave no picture.',

  geometry: 'Turn and crop',
  turnLeft: 'Turn left by a quarter',
  turnRight: 'Turn right by a quarter',
  turn: 'Clockwise turn',
  turnHint: 'Between −180 and 180.',
  turnWrong: 'Type an angle between −180 and 180.',
  settings: {
    level: 'Straighten by a level line',
    corners: 'Rectify a photograph',
    crop: 'Crop',
  },
  settingLeads: {
    level: 'Set both ends on a line that should be level, such as a border or a water level.',
    corners: 'Set the four corners on those of the sheet or its border. They become a rectangle.',
    crop: 'Set two opposite corners of what is to be kept.',
  },
  apply: {
    level: 'Make the line level',
    corners: 'Make it a rectangle',
    crop: 'Crop to the frame',
  },
  cancel: 'Cancel',
  remove: {
    corners: 'Undo the rectifying',
    crop: 'Undo the crop',
  },
  refused: {
    level: 'The two ends lie on the same place.',
    corners: 'The corners must follow one another clockwise around the drawing.',
    crop: 'The frame is too small.',
  },
  handles: {
    level: ['First end of the line', 'Second end of the line'],
    corners: ['Top left corner', 'Top right corner', 'Bottom right corner', 'Bottom left corner'],
    crop: ['First corner of the frame', 'Second corner of the frame'],
  },
  handleHelp: 'Drag, or move by arrow keys: one pixel, with Shift ten.',
  handlePlace: (x: number, y: number) => `${Math.round(x)}, ${Math.round(y)} px`,
  photographNote:
    'Figures are read from the known points. For a photograph taken at a slant set the section out with four known points or more and “perspective”.',

  tones: 'Tones',
  whiten: 'Make the paper evenly white',
  black: 'Becomes black',
  white: 'Becomes white',
  blackAndWhite: 'Black and white only',
  threshold: 'Darker than this becomes black',
  invert: 'Invert',
  specks: 'Take out specks up to',
  specksUnit: 'px',
  specksHint: '0 takes out none. Lines stay, however thin.',
  specksWrong: (most: number) => `Type a whole number from 0 to ${most}.`,
  closeUp: 'Close-up at full size',
  closeUpHint:
    'Press the picture to look at another place. Thin lines may look broken in small; here they are as they will be.',

  pictures: 'Pictures of this sheet',
  scan: 'The scan',
  scanLead: 'As it was uploaded',
  shown: 'shown',
  show: 'Show',
  showOf: (what: string) => `Show ${what}`,
  showOriginal: 'Show the scan',
  startFrom: 'Start from this',
  startFromOf: (what: string) => `Start from ${what}`,
  nowShown: 'The sheet is shown by another picture. Traces stay where they are.',
  being: { waiting: 'Waiting to be made', running: 'Being made' },
  making: (what: string) => `${what}, being made`,
  madeBy: (who: string, when: string) => `${who}, ${when}`,
  shownBy: 'On the desk this sheet is shown by a cleaned-up picture. Here it stands as it was scanned.',
  what: {
    corners: 'rectified',
    turned: (deg: string) => `turned ${deg}°`,
    crop: 'cropped',
    whiten: 'paper whitened',
    specks: 'without specks',
    levels: 'contrast',
    threshold: 'black and white',
    invert: 'inverted',
    nothing: 'as scanned',
  },
} as const;
export const cleanUpText = inLanguage({ en });
