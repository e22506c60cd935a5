import type { NetFileQuestion } from '#shared/contract/net-files.ts';
import { inLanguage } from './language.ts';

const en = {
  button: 'Net from a file',
  buttonOf: (label: string) => `Net from a file for ${label}`,
  title: (label: string) => `Net from a file for ${label}`,
  blankTitle: 'Net from a file on an empty sheet',
  lead: 'A file that was taken out of the desk of this sheet. It becomes a net of its own; nothing here is changed by it.',
  blankLead:
    'A file that was taken out of a desk, without its drawing. A white sheet of the same size is made for it.',
  file: 'Net file (JSON)',
  fileNeeded: 'Choose the file first.',
  tooLarge: 'The file is larger than the 6 MB that are taken. Check that it is the one that the desk gave.',
  unreadable: 'The file could not be read from this device. Choose it again.',
  section: 'Section',
  sectionHint: 'Its letter or name: B–B, Spillway axis.',
  name: 'Load case',
  nameHint: 'Full supply, flood 119.40, drawn by the designer …',
  nameNeeded: 'Name the load case.',
  sectionNeeded: 'Name the section.',
  make: 'Make the net and open the desk',
  makeAllTheSame: 'Make the net all the same',
  accept: {
    datum: 'The elevations differ',
    setOut: 'The known points differ',
  } satisfies Record<NetFileQuestion, string>,
  made: 'The net is made.',
} as const;
export const netFileText = inLanguage({ en });
