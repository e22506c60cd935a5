import { fixedText } from '#client/lib/figures.ts';
import { inLanguage } from './language.ts';

/** Words around the calculation sheet. */
const en = {
  title: 'Calculation sheet',
  leadRevision: 'The frozen record as a PDF, with the section, all figures, their sources and the decision.',
  leadDraft: 'The net as it is saved, as a PDF marked DRAFT on each page.',
  paper: 'Paper',
  jobNumber: 'Job number',
  jobNumberHint: 'May stay empty.',
  make: 'Calculation sheet',
  making: 'Asking…',
  waiting: 'being made…',
  download: 'Download PDF',
  printView: 'Print view',
  size: (byteSize: number) => `${fixedText(byteSize / 1e6, 1)} MB`,
  print: 'Print',
  backToCheck: 'Back to the check',
} as const;
export const calculationSheetText = inLanguage({ en });
