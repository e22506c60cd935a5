import { mkdirSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { v7 as uuidv7 } from 'uuid';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { DrawingEntity, SheetEntity } from '#server/entities/drawing-entity.ts';
import type { RouteRecord, TargetKind } from '#server/http/route-record.ts';
import { routes } from '#server/routes/index.ts';
import { queueMail } from '#server/services/mail-service.ts';
import { inTransaction } from '#server/services/service-deps.ts';
import { originalKey, thumbnailKey, tileKey, tilePrefix } from '#server/storage/storage-keys.ts';
import type { DamAction, GlobalAction } from '#shared/contract/actions.ts';
import { damAction } from '#shared/contract/actions.ts';
import type { Caller } from '#tests/support/caller.ts';
import { pngDrawing } from '#tests/support/drawing-files.ts';
import { addFinishedNet, openNet } from '#tests/support/net-fixture.ts';
import { reasonsFor } from '#tests/support/revision-fixture.ts';
import { createTestApp, type TestApp } from '#tests/support/test-app.ts';
import { testLetter } from '#tests/support/test-letter.ts';
import { addDam, addMember } from '#tests/support/test-people.ts';

/**
 * Walks every route with everyone who might call it. What is expected is written out here and not taken from the
 * policy module, so that a slip there shows. A new route with a dam's or a global action is covered as it is; one
 * that is public or asks for no more than a sign-in has to be entered below, after some thought.
 */
const ROLES = ['anonymous', 'stranger', 'colleague', 'reviewer', 'engineer', 'admin'] as const;
type Role = (typeof ROLES)[number];

const MAY_ON_DAM: Record<DamAction, readonly Role[]> = {
  'dam.read': ['colleague', 'reviewer', 'engineer', 'admin'],
  'dam.edit': ['engineer', 'admin'],
  'dam.manageMembers': ['engineer', 'admin'],
  'dam.archive': ['engineer', 'admin'],
  'drawing.upload': ['engineer'],
  'drawing.edit': ['engineer'],
  'drawing.archive': ['engineer'],
  'section.edit': ['engineer'],
  'net.trace': ['engineer'],
  'net.archive': ['engineer'],
  'net.send': ['engineer'],
  'note.write': ['colleague', 'reviewer', 'engineer'],
  'revision.decide': ['reviewer'],
};
const MAY_GLOBALLY: Record<GlobalAction, readonly Role[]> = {
  'dam.create': ['admin'],
  'people.manage': ['admin'],
  'mail.read': ['admin'],
};
const PUBLIC = [
  'get /session',
  'post /session',
  'delete /session',
  'post /password-resets',
  'post /password-resets/complete',
  'post /invitations/look-up',
  'post /invitations/accept',
  // Leads to the page; the link is no secret and does nothing by being opened.
  'get /digest-stops',
];
/** Decided by the signature of the link alone: a mail program has neither a session nor its token. */
const SIGNED_LINK = ['post /digest-stops'];
/** About the caller alone, or filtered by what the caller may see. */
const SIGNED_IN = [
  'post /session/end-all',
  'post /me/password',
  'patch /me',
  'get /dams',
  'get /register',
  'get /waiting',
  'get /live',
  'get /mails',
  'get /mails/:mailId',
  'get /me/mail-choice',
  'put /me/mail-choice',
];
const TARGETS: readonly TargetKind[] = ['dam', 'drawing', 'sheet', 'section', 'net', 'note', 'revision'];

const nameOf = (route: RouteRecord) => `${route.method} ${route.path}`;
const paramsOf = (route: RouteRecord) =>
  [...route.path.matchAll(/:(\w+)/g)].map((match) => match[1] as string);

type Outcome = 'passes' | 'sign in first' | 'hidden' | 'refused';

function expectedFor(route: RouteRecord, role: Role): Outcome {
  const { access } = route;
  if (access.who === 'public' || access.who === 'signedLink') return 'passes';
  if (role === 'anonymous') return 'sign in first';
  if (access.who === 'signedIn') return 'passes';
  if (access.who === 'global') return MAY_GLOBALLY[access.action].includes(role) ? 'passes' : 'refused';
  if (!MAY_ON_DAM['dam.read'].includes(role)) return 'hidden';
  return MAY_ON_DAM[access.action].includes(role) ? 'passes' : 'refused';
}

let app: TestApp;
let damId: string;
const callers = {} as Record<Role, Caller>;
const ids: Record<string, string> = { rendition: 'base', z: '0', tile: '0_0.png' };

beforeAll(async () => {
  app = await createTestApp();
  const place = await addFinishedNet(app);
  damId = place.damId;
  callers.engineer = place.caller;
  for (const role of ['colleague', 'reviewer'] as const) {
    const { person, caller } = await app.signIn(role);
    await addMember(app.db, damId, person.id, role);
    callers[role] = caller;
    ids[`${role}Person`] = person.id;
  }
  // Everything on a dam of their own, nothing on this one.
  const stranger = await app.signIn('stranger');
  const elsewhere = await addDam(app.db, stranger.person.id);
  await addMember(app.db, elsewhere, stranger.person.id, 'engineer', 'reviewer', 'colleague');
  callers.stranger = stranger.caller;
  callers.admin = (await app.signIn('admin', { admin: true })).caller;
  callers.anonymous = app.caller();
  await callers.anonymous.open();
  Object.assign(ids, place, { personId: stranger.person.id }, await furnish(place.netId, place.sheetId));
});
afterAll(() => app.close());

/** A note, a revision, a mail, and the files that a sheet has in storage. */
async function furnish(netId: string, sheetId: string): Promise<Record<string, string>> {
  const noteId = uuidv7();
  const note = { id: noteId, anchor: { on: 'place', at: [1, 1] }, text: 'Why?' };
  const { body: written } = await callers.colleague.post(`/nets/${netId}/notes`, note).expect(201);
  const fileId = uuidv7();
  await callers.colleague
    .post(`/nets/${netId}/note-files?id=${fileId}`)
    .attach('file', await pngDrawing(), 'photo.png')
    .expect(201);
  const answer = { id: uuidv7(), text: 'See the photograph.', fileIds: [fileId] };
  await callers.colleague.post(`/notes/${noteId}/answers`, answer).expect(201);
  const revisionId = uuidv7();
  const { changeNumber } = await openNet(callers.engineer, netId);
  const sending = {
    id: revisionId,
    reviewerIds: [ids.reviewerPerson],
    message: '',
    changeNumber,
    reasons: await reasonsFor(callers.engineer, netId),
  };
  await callers.engineer.post(`/nets/${netId}/revisions`, sending).expect(201);
  const mailId = await inTransaction(app.deps, (tx) =>
    queueMail(tx, { personId: null, to: 'a@harrow-fen.example', ...testLetter() }),
  );
  const sheet = await app.db.getRepository(SheetEntity).findOneByOrFail({ id: sheetId });
  const drawing = await app.db.getRepository(DrawingEntity).findOneByOrFail({ id: sheet.drawingId });
  const tiles = tilePrefix(sheetId, 'base');
  for (const key of [originalKey(drawing.sha256), thumbnailKey(tiles), tileKey(tiles, 0, 0, 0, 'png')]) {
    const file = path.join(app.storageDir, key);
    mkdirSync(path.dirname(file), { recursive: true });
    writeFileSync(file, 'bytes');
  }
  const calculationSheetId = uuidv7();
  const asked = { id: calculationSheetId, revisionId, paper: 'A4', jobNumber: '' };
  await callers.colleague.post(`/nets/${netId}/calculation-sheets`, asked).expect(202);
  return {
    noteId,
    entryId: written.entries[0].id,
    fileId,
    revisionId,
    mailId,
    calculationSheetId,
    drawingId: drawing.id,
    clientId: uuidv7(),
  };
}

interface Answer {
  status: number;
  code: string | null;
  detail: string | null;
}

/** Calls a route; a stream is left as soon as it has answered. */
async function call(
  route: RouteRecord,
  role: Role,
  { csrfToken = callers[role].csrfToken, targets = ids } = {},
): Promise<Answer> {
  const address = route.path.replaceAll(/:(\w+)/g, (_match, name: string) => targets[name] ?? `no-${name}`);
  const isRead = route.method === 'get';
  const leave = new AbortController();
  const response = await fetch(`${app.address}/api/v1${address}`, {
    method: route.method.toUpperCase(),
    headers: {
      cookie: callers[role].cookieHeader(),
      ...(isRead ? {} : { 'x-csrf-token': csrfToken, 'content-type': 'application/json' }),
    },
    ...(isRead ? {} : { body: '{}' }),
    signal: leave.signal,
  });
  if (response.status < 400) {
    leave.abort();
    return { status: response.status, code: null, detail: null };
  }
  const { code, detail } = await response.json();
  return { status: response.status, code, detail };
}

/** A write with a wrong token changes nothing, and shows by its answer whether it got past the rule. */
const outcomeOf = ({ status, code }: Answer): Outcome => {
  if (code === 'csrf') return 'passes';
  if (status === 401) return 'sign in first';
  if (status === 403 && code === 'forbidden') return 'refused';
  return status === 404 ? 'hidden' : 'passes';
};

describe('the routes', () => {
  it('state a rule each, and those open to all or to all who sign in are the ones thought about', () => {
    const by = (who: string) => routes.filter((route) => route.access.who === who).map(nameOf);
    expect(by('public').sort()).toEqual([...PUBLIC].sort());
    expect(by('signedLink')).toEqual(SIGNED_LINK);
    expect(by('signedIn').sort()).toEqual([...SIGNED_IN].sort());
    expect(new Set(routes.map(nameOf)).size).toBe(routes.length);
  });

  it('that name something of a dam are ruled by that dam', () => {
    for (const route of routes) {
      const named = paramsOf(route).filter((param) => TARGETS.some((target) => param === `${target}Id`));
      const target = route.access.who === 'dam' ? `${route.access.target}Id` : undefined;
      // Only one: a second would be a way to reach into another dam under cover of the first.
      expect(named, nameOf(route)).toEqual(target ? [target] : []);
    }
  });

  it('have something real to be called with', () => {
    for (const route of routes)
      for (const param of paramsOf(route)) expect(ids[param], `${nameOf(route)} ${param}`).toBeDefined();
  });
});

describe.each(ROLES)('for %s', (role) => {
  it.each(routes.map((route) => [nameOf(route), route] as const))(
    '%s answers by the table',
    async (_, route) => {
      const answer = await call(route, role, { csrfToken: 'wrong' });
      // Somebody else's mail is hidden by the list's own rule, which has its own test.
      const ownRule = route.path === '/mails/:mailId' && role !== 'admin' && role !== 'anonymous';
      const expected = ownRule ? 'hidden' : expectedFor(route, role);
      expect(outcomeOf(answer), JSON.stringify(answer)).toBe(expected);
      const needsToken = route.method !== 'get' && route.access.who !== 'signedLink';
      if (expected === 'passes' && needsToken) expect(answer.code).toBe('csrf');
      // A right token does not help whoever may not.
      if (expected !== 'passes') expect(await call(route, role)).toEqual(answer);
    },
  );

  it('GET /dams/:damId says what they may do, as the table has it', async () => {
    const { status, body } = await callers[role].get(`/dams/${damId}`);
    const may = damAction.options.filter((action) => MAY_ON_DAM[action].includes(role));
    if (may.length === 0) expect([401, 404]).toContain(status);
    else expect([...body.can].sort()).toEqual([...may].sort());
  });
});

describe('what is hidden', () => {
  const ruled = routes.filter((route) => route.access.who === 'dam');
  it.each(ruled.map((route) => [nameOf(route), route] as const))(
    '%s answers a stranger as if it did not exist',
    async (_, route) => {
      const nothing = Object.fromEntries(Object.keys(ids).map((name) => [name, uuidv7()]));
      const missing = await call(route, 'engineer', { targets: { ...ids, ...nothing } });
      expect(missing).toEqual(await call(route, 'stranger'));
    },
  );
});
