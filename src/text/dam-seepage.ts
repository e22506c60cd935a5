import { inLanguage } from './language.ts';

/** Words of the seepage along a dam. */
const en = {
  title: 'Seepage along the dam',
  pageTitle: (dam: string) => `${dam}: seepage along the dam`,
  lead: 'Choose one net for each section. Between neighbouring sections the mean of their seepages is taken; nothing is added beyond the first and the last.',
  caution:
    'Each net is a two-dimensional, steady-state estimate, read as it stands now. The factor (×/÷ at 95 %) is the greatest of the sections’, as what is not known of the permeability is common to them; it says nothing about the ground between them. Local codes and licensed practice decide what may be built on it.',
  sections: 'Sections and their nets',
  none: 'No section has been cut yet. Open a drawing of this dam, cut a section from it and trace a net.',
  toDam: 'To the drawings of this dam',
  section: 'Section',
  chainage: (unit: string) => `Chainage, ${unit}`,
  net: 'Net',
  netOf: (section: string) => `Net for ${section}`,
  noNet: 'not chosen',
  noneToChoose: 'no net yet',
  putAway: (net: string) => `${net} (put away)`,
  headwater: (unit: string) => `Headwater, ${unit}`,
  tailwater: (unit: string) => `Tailwater, ${unit}`,
  perMetre: (unit: string) => `Per metre of dam, ${unit}`,
  perFoot: (unit: string) => `Per foot of dam, ${unit}`,
  factor: 'Factor ×/÷',
  tracedOnly: 'Traced channels only: the flow beside them is not counted.',
  leftOut: (reason: string) => `Left out. ${reason}`,
  openNet: 'Open the net',
  noChainage: 'none',
  workingOut: 'working out…',
  length: 'Over the length',
  from: (unit: string) => `From, ${unit}`,
  to: (unit: string) => `To, ${unit}`,
  reach: (unit: string) => `Length, ${unit}`,
  flow: (unit: string) => `Seepage, ${unit}`,
  total: 'Total',
  noFactor: 'no factor entered',
  needsTwo:
    'A total needs two sections at least, each with a chainage and a net that gives a seepage. Nothing is chosen for you: nets of different load cases must not be added.',
  download: 'Download CSV',
  startAgain: 'Start with no net chosen',
  fileName: (dam: string) => `${dam} seepage along the dam.csv`,
} as const;
export const damSeepageText = inLanguage({ en });
