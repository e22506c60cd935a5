import { inLanguage } from './language.ts';

/** Words of what may be taken out of a net, a revision or a dam as a file. */
const en = {
  button: 'Download',
  label: 'Download from this net',
  schedule: 'Schedule (CSV)',
  traces: 'Traces for CAD (DXF)',
  net: 'Net file (JSON)',
  tracesOf: 'Download DXF',
  activity: 'Download CSV',
  notSetOut: 'Set the section out first: a CAD file needs offsets and elevations.',
} as const;
export const downloadsText = inLanguage({ en });
