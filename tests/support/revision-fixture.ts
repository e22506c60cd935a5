import { v7 as uuidv7 } from 'uuid';
import type { DamRole } from '#shared/contract/actions.ts';
import type { RevisionDto, SendingDto } from '#shared/contract/revisions.ts';
import type { Caller } from './caller.ts';
import { addFinishedNet, batchesOf, lineOf, type NetPlaceFixture, openNet, put } from './net-fixture.ts';
import type { TestApp } from './test-app.ts';
import { addMember, TEST_PASSWORD, type TestPerson } from './test-people.ts';

export interface SignedIn {
  person: TestPerson;
  caller: Caller;
}
export interface ReadyNet extends NetPlaceFixture {
  reviewer: SignedIn;
}

/** Somebody with parts on the dam, signed in. */
export async function addRolePerson(
  app: TestApp,
  damId: string,
  name: string,
  ...roles: DamRole[]
): Promise<SignedIn> {
  const { person, caller } = await app.signIn(name);
  await addMember(app.db, damId, person.id, ...roles);
  return { person, caller };
}

/** What a person of the tests signs with. */
export const SIGNATURE = { password: TEST_PASSWORD, capacity: 'Reviewing engineer' };

/** A finished net with a reviewer who did not draw it. */
export async function readyToSend(app: TestApp): Promise<ReadyNet> {
  const place = await addFinishedNet(app);
  return { ...place, reviewer: await addRolePerson(app, place.damId, 'Remi Okafor', 'reviewer') };
}

/** What sends the net as it stands to the reviewer. */
export async function sendInputFor({ caller, netId }: NetPlaceFixture, ...reviewerIds: string[]) {
  const { changeNumber } = await openNet(caller, netId);
  const reasons = await reasonsFor(caller, netId);
  return { id: uuidv7(), reviewerIds, message: 'Please look at line 3.', changeNumber, reasons };
}

/** A reason for all that is still open on the net, as the send dialog gives it. */
export async function reasonsFor(caller: Caller, netId: string) {
  const { body } = await caller.get(`/nets/${netId}/sending`).expect(200);
  return (body as SendingDto).open.map(({ key }) => ({ key, reason: 'Known to the office.' }));
}

/** A finished net that was sent to its reviewer, who has opened the figures and answered the check list. */
export async function sentRevision(app: TestApp): Promise<ReadyNet & { revisionId: string }> {
  const sent = await sentUnopened(app);
  await readyToDecide(sent.reviewer.caller, sent.revisionId);
  return sent;
}

/** A finished net that was sent to its reviewer, who may still read it blind. */
export async function sentUnopened(
  app: TestApp,
  how: { blindFirst?: boolean } = {},
): Promise<ReadyNet & { revisionId: string }> {
  const place = await readyToSend(app);
  const input = { ...(await sendInputFor(place, place.reviewer.person.id)), ...how };
  await place.caller.post(`/nets/${place.netId}/revisions`, input).expect(201);
  return { ...place, revisionId: input.id };
}

/** The reviewer opens the figures and answers every item of the check list, after which nothing holds a decision up. */
export async function readyToDecide(caller: Caller, revisionId: string): Promise<void> {
  const { body } = await caller.post(`/revisions/${revisionId}/figure-openings`).expect(201);
  const { checking } = body as RevisionDto;
  const answers = checking?.checkList.map(({ id }) => ({ itemId: id, answer: 'yes', remark: '' }));
  await caller.patch(`/revisions/${revisionId}/check-draft`, { answers }).expect(200);
}

/** Begins a line, which changes the net and none of its figures. */
export async function beginLine(caller: Caller, netId: string): Promise<void> {
  const line = lineOf([[3, 3]], { finished: false });
  await caller.post(`/nets/${netId}/commands`, batchesOf()([put(line)], 'began a line')).expect(200);
}

/** The mails queued for a person, oldest first. */
export const mailsFor = (
  app: TestApp,
  personId: string,
): Promise<Array<{ id: string; subject: string; text: string }>> =>
  app.db.query('SELECT id, subject, text FROM outbox_mail WHERE person_id = $1 ORDER BY id', [personId]);
