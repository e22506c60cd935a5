import { AppError } from './app-error.ts';

/** The figures of a revision are asked for by a reviewer who may still read it blind. */
export const figuresKeptBack = ({ id, label }: { id: string; label: string }) =>
  new AppError(
    'figures-kept-back',
    409,
    'The figures are kept back',
    `Revision ${label} of this net waits for your check, and you may still read it blind. Open its check and read points on the net alone, or open the figures.`,
    { extra: { revisionId: id } },
  );
