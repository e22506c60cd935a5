import { createHash, randomBytes } from 'node:crypto';
import { type EntityManager, IsNull } from 'typeorm';
import { v7 as uuidv7 } from 'uuid';
import { PersonTokenEntity } from '#server/entities/person-entity.ts';
import { AppError } from '#server/errors/app-error.ts';

export type TokenPurpose = PersonTokenEntity['purpose'];

export const INVITATION_DAYS = 7;
export const RESET_MINUTES = 60;
const LIFETIME_MS: Record<TokenPurpose, number> = {
  invitation: INVITATION_DAYS * 24 * 60 * 60 * 1000,
  reset: RESET_MINUTES * 60 * 1000,
};

/** A token is random enough that a fast hash of it is as good as a slow one of a password. */
const hashOf = (token: string) => createHash('sha256').update(token).digest('hex');

export interface TokenRequest {
  personId: string;
  purpose: TokenPurpose;
  issuedBy: string | null;
  damId: string | null;
  now: Date;
}

/** Makes a token for a link; earlier ones of the same purpose stop working. Only its hash is kept. */
export async function issueToken(manager: EntityManager, request: TokenRequest): Promise<string> {
  const { personId, purpose, issuedBy, damId, now } = request;
  await voidTokens(manager, personId, now, purpose);
  const token = randomBytes(32).toString('base64url');
  await manager.insert(PersonTokenEntity, {
    id: uuidv7(),
    personId,
    purpose,
    tokenHash: hashOf(token),
    issuedBy,
    damId,
    createdAt: now,
    expiresAt: new Date(now.getTime() + LIFETIME_MS[purpose]),
  });
  return token;
}

/** Ends a person's unused tokens: all of them, or those of one purpose. */
export async function voidTokens(
  manager: EntityManager,
  personId: string,
  now: Date,
  purpose?: TokenPurpose,
): Promise<void> {
  await manager.update(
    PersonTokenEntity,
    { personId, usedAt: IsNull(), ...(purpose ? { purpose } : {}) },
    { usedAt: now },
  );
}

/** One answer for links that never existed, were used, replaced or have expired. */
const tokenInvalid = () =>
  new AppError(
    'token-invalid',
    410,
    'This link does not work any more',
    'The link was used already or has expired. Ask for a new one.',
  );

/** The token's row while it may be used. @throws AppError token-invalid */
export async function findToken(
  manager: EntityManager,
  token: string,
  purpose: TokenPurpose,
  now: Date,
): Promise<PersonTokenEntity> {
  const row = await manager.findOneBy(PersonTokenEntity, {
    tokenHash: hashOf(token),
    purpose,
    usedAt: IsNull(),
  });
  if (!row || row.expiresAt <= now) throw tokenInvalid();
  return row;
}

/**
 * Uses the token up and returns whose it was. One statement decides, so that of two requests at once only one
 * gets through.
 * @throws AppError token-invalid
 */
export async function consumeToken(
  manager: EntityManager,
  token: string,
  purpose: TokenPurpose,
  now: Date,
): Promise<string> {
  const row = await findToken(manager, token, purpose, now);
  const { affected } = await manager.update(
    PersonTokenEntity,
    { id: row.id, usedAt: IsNull() },
    { usedAt: now },
  );
  if (affected !== 1) throw tokenInvalid();
  return row.personId;
}
