import { v7 as uuidv7 } from 'uuid';
import type { DamRole } from '#shared/contract/actions.ts';
import type { SendingDto } from '#shared/contract/revisions.ts';
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

/** A finished net that was sent to its reviewer. */
export async function sentRevision(app: TestApp): Promise<ReadyNet & { revisionId: string }> {
  const place = await readyToSend(app);
  const input = await sendInputFor(place, place.reviewer.person.id);
  await place.caller.post(`/nets/${place.netId}/revisions`, input).expect(201);
  return { ...place, revisionId: input.id };
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
