import * as z from 'zod/mini';
import { globalAction } from './actions.ts';
import { email, id, requiredText, timestamp } from './common.ts';
import { MAX_PASSWORD_LENGTH, MIN_PASSWORD_LENGTH } from './limits.ts';

export const newPassword = z
  .string()
  .check(z.minLength(MIN_PASSWORD_LENGTH), z.maxLength(MAX_PASSWORD_LENGTH));

/** `GET /session`: who is signed in, the token every write sends as `X-CSRF-Token`, and what needs no dam. */
export const sessionDto = z.object({
  person: z.nullable(z.object({ id, name: z.string(), email: z.string(), admin: z.boolean() })),
  csrfToken: z.string(),
  can: z.array(globalAction),
  /** Demo sign-ins to offer on the sign-in page; empty outside the demo. */
  demoSignIns: z.array(
    z.object({ name: z.string(), email: z.string(), password: z.string(), part: z.string() }),
  ),
  /** True when mails are written to the outbox folder and can be read at a page. */
  outboxReadable: z.boolean(),
});
export type SessionDto = z.infer<typeof sessionDto>;

export const signInInput = z.object({ email, password: z.string().check(z.maxLength(MAX_PASSWORD_LENGTH)) });
export const passwordResetRequest = z.object({ email });
export const passwordResetInput = z.object({
  token: z.string().check(z.maxLength(200)),
  password: newPassword,
});
export const invitationLookup = z.object({ token: z.string().check(z.maxLength(200)) });
export const invitationDto = z.object({
  email: z.string(),
  invitedBy: z.string(),
  damName: z.nullable(z.string()),
});
export const invitationAcceptInput = z.object({
  token: z.string().check(z.maxLength(200)),
  name: requiredText,
  password: newPassword,
});
export const passwordChangeInput = z.object({
  current: z.string().check(z.maxLength(MAX_PASSWORD_LENGTH)),
  next: newPassword,
});
export const meInput = z.object({ name: requiredText });

export const personDto = z.object({
  id,
  name: z.string(),
  email: z.string(),
  admin: z.boolean(),
  /** `invited` until the invitation is accepted. */
  state: z.enum(['active', 'invited', 'deactivated']),
  createdAt: timestamp,
});
export type PersonDto = z.infer<typeof personDto>;
export const personListDto = z.object({ items: z.array(personDto) });
export const invitePersonInput = z.object({ email, admin: z.boolean() });
export const personPatch = z.object({ admin: z.optional(z.boolean()), active: z.optional(z.boolean()) });
