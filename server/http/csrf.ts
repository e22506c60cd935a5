import { csrfSync } from 'csrf-sync';
import type { Request } from 'express';

/**
 * Synchroniser token kept in the session and sent back in a header. A header, never a form field, so that an
 * upload is judged before its bytes are read.
 */
const { generateToken, isRequestValid } = csrfSync({
  getTokenFromRequest: (req) => req.get('x-csrf-token'),
});

/** The token of this session, made when there is none yet. */
export const csrfTokenOf = (req: Request): string => generateToken(req);
export const isCsrfTokenValid = (req: Request): boolean => isRequestValid(req);
