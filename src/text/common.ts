import { inLanguage } from './language.ts';

const en = {
  product: 'Tracehead',
  loading: 'Loading…',
  skip: 'Skip to the content',
  trail: 'Where you are',
  close: 'Close',
  cancel: 'Cancel',
  save: 'Save',
  saving: 'Saving…',
  saved: 'Saved.',
  sending: 'Sending…',
  putAway: 'Put away',
  bringBack: 'Bring back',
  noneYet: 'none yet',
} as const;
export const commonText = inLanguage({ en });
