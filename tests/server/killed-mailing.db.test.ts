import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { RevisionDto } from '#shared/contract/revisions.ts';
import { Caller } from '#tests/support/caller.ts';
import { someoneWaits, until, whileHeld } from '#tests/support/held-steps.ts';
import { addFinishedNet, type NetPlaceFixture } from '#tests/support/net-fixture.ts';
import { type RealServer, startRealServer } from '#tests/support/real-server.ts';
import {
  beginLine,
  readyToDecide,
  SIGNATURE,
  type SignedIn,
  sendInputFor,
} from '#tests/support/revision-fixture.ts';
import { type SmtpStandIn, type SmtpStep, startSmtpStandIn } from '#tests/support/smtp-stand-in.ts';
import { addMember, addPerson } from '#tests/support/test-people.ts';

/**
 * A real server, ended by SIGKILL at each step of sending for checking, of signing and of mailing, started again on the
 * same database, and asked again as a browser would ask. The steps are held by locks on the tables that they write.
 */
let smtp: SmtpStandIn;
let server: RealServer;
let place: NetPlaceFixture;
let reviewer: SignedIn;
let colleague: SignedIn;

const signIn = async (name: string): Promise<SignedIn> => {
  const person = await addPerson(server.db, name);
  const caller = new Caller(server.address);
  await caller.signIn(person.email, person.password);
  return { person, caller };
};
beforeAll(async () => {
  smtp = await startSmtpStandIn();
  server = await startRealServer({ SMTP_URL: smtp.url });
  place = await addFinishedNet({ db: server.db, signIn });
  reviewer = await signIn('Remi Okafor');
  colleague = await signIn('Tove Lind');
  await addMember(server.db, place.damId, reviewer.person.id, 'reviewer');
  await addMember(server.db, place.damId, colleague.person.id, 'colleague');
}, 120_000);
afterAll(async () => {
  await server.close();
  await smtp.close();
});

const nothing = () => {};
const writesTo = (table: string) => `LOCK TABLE ${table} IN SHARE MODE`;

/** Everything that a step could leave behind by half. */
async function kept() {
  const [row] = await server.db.query(`SELECT
    (SELECT count(*)::int FROM revision) AS revisions, (SELECT count(*)::int FROM decision) AS decisions,
    (SELECT count(*)::int FROM outbox_mail) AS mails, (SELECT count(*)::int FROM event) AS events`);
  return row;
}

/** Kills the server while a request stands still before writing to a table, and starts it again. */
async function killedAt(table: string, ask: () => Promise<unknown>): Promise<void> {
  await whileHeld(server.db, writesTo(table), async () => {
    const asking = ask().then(nothing, nothing);
    await until(() => someoneWaits(server.db));
    await server.kill();
    await asking;
  });
  await restart();
}

/** Ends what stands before a lock, as if its connection had broken there. */
const endWaiting = () =>
  server.db.query(
    "SELECT pg_terminate_backend(pid) FROM pg_stat_activity WHERE datname = current_database() AND wait_event_type = 'Lock'",
  );

/** A worker that is gone holds its mail until its lease is over; the clock is put on instead of waiting. */
async function restart(): Promise<void> {
  await server.db.query(
    `UPDATE outbox_mail SET lease_until = now() - interval '1 s' WHERE lease_until IS NOT NULL`,
  );
  await server.restart();
}
const allSent = () =>
  until(async () => {
    const [{ count }] = await server.db.query(
      `SELECT count(*)::int FROM outbox_mail WHERE state NOT IN ('sent', 'held', 'inDigest')`,
    );
    return count === 0;
  });
const receivedFor = ({ person }: SignedIn) =>
  smtp.received.filter(({ to }) => [to].flat().some((each) => each?.text.includes(person.email)));

describe('a server that is killed while a net is sent for checking', () => {
  it.each(['revision', 'outbox_mail', 'event'])(
    'before it writes to %s has sent nothing, and takes the same sending once when it is repeated',
    async (table) => {
      await beginLine(place.caller, place.netId);
      const input = await sendInputFor(place, reviewer.person.id);
      const before = await kept();
      const ask = () => place.caller.post(`/nets/${place.netId}/revisions`, input);
      await killedAt(table, async () => ask());
      expect(await kept()).toEqual(before);
      await ask().expect(201);
      await ask().expect(201);
      expect(await kept()).toEqual({
        ...before,
        revisions: before.revisions + 1,
        mails: before.mails + 1,
        events: before.events + 1,
      });
      await allSent();
      expect(receivedFor(reviewer)).toHaveLength(before.revisions + 1);
    },
    60_000,
  );
});

describe('a server that is killed while a decision is signed', () => {
  let revisionId: string;
  const sign = () =>
    reviewer.caller.post(`/revisions/${revisionId}/decision`, {
      decision: 'accepted',
      note: '',
      ...SIGNATURE,
    });
  beforeAll(async () => {
    const rows = await server.db.query('SELECT id FROM revision ORDER BY number DESC LIMIT 1');
    revisionId = rows[0].id;
    await readyToDecide(reviewer.caller, revisionId);
  });

  // The first of what it writes and the last.
  it.each(['decision', 'event'])(
    'before it writes to %s has decided nothing',
    async (table) => {
      const before = await kept();
      await killedAt(table, async () => sign());
      expect(await kept()).toEqual(before);
      const { body } = await reviewer.caller.get(`/revisions/${revisionId}`).expect(200);
      expect((body as RevisionDto).summary.state).toBe('waiting');
    },
    60_000,
  );

  it('takes the signature once when it is given again', async () => {
    const before = await kept();
    await sign().expect((response) => expect(response.status, response.text).toBeLessThan(300));
    expect((await sign()).body.code).toBe('already-decided');
    const after = { decisions: before.decisions + 1, mails: before.mails + 1, events: before.events + 1 };
    expect(await kept()).toEqual({ ...before, ...after });
    await allSent();
  });
});

describe('a server that is killed while it mails', () => {
  const nameReviewer = async (text: string) => {
    const id = crypto.randomUUID();
    const note = { id, anchor: { on: 'drawing' }, text: `@${reviewer.person.name} ${text}` };
    await colleague.caller.post(`/nets/${place.netId}/notes`, note).expect(201);
  };
  const copiesOf = (text: string) =>
    receivedFor(reviewer)
      .filter((mail) => mail.text?.includes(text))
      .map((mail) => mail.messageId);

  it.each<[SmtpStep, number]>([
    ['recipient', 1],
    ['end', 2],
  ])(
    'at the step "%s" of the delivery delivers the mail after all, at most again under the same Message-ID',
    async (step, copies) => {
      const reached = smtp.stallAt(step);
      await nameReviewer(`stands at ${step}`);
      await reached;
      await server.kill();
      await restart();
      await allSent();
      const ids = copiesOf(`stands at ${step}`);
      expect(ids).toHaveLength(copies);
      expect(new Set(ids).size).toBe(1);
    },
    60_000,
  );

  it('after the mail was taken over and before that is noted sends it again under the same Message-ID', async () => {
    let noteIsHeld: Promise<void> | undefined;
    let killed: () => void = nothing;
    const untilKilled = new Promise<void>((resolve) => {
      killed = resolve;
    });
    smtp.onReceived(
      () =>
        // The answer is given once nothing can be noted any more.
        new Promise<void>((answer) => {
          smtp.onReceived(nothing);
          noteIsHeld = whileHeld(server.db, writesTo('outbox_mail'), async () => {
            answer();
            await until(() => someoneWaits(server.db));
            await server.kill();
            // What the server has asked for would still be done, once nothing holds it any more.
            await endWaiting();
            killed();
          });
        }),
    );
    await nameReviewer('taken and not noted');
    await untilKilled;
    await noteIsHeld;
    await restart();
    await allSent();
    const ids = copiesOf('taken and not noted');
    expect(ids).toHaveLength(2);
    expect(new Set(ids).size).toBe(1);
  }, 60_000);

  it('in the middle of a digest tells each notice once', async () => {
    const choice = { timing: 'daily', timeZone: 'Europe/Vienna' };
    await reviewer.caller.put('/me/mail-choice', choice).expect(200);
    for (const text of ['held the first', 'held the second']) await nameReviewer(text);
    await whileHeld(server.db, writesTo('outbox_mail'), async () => {
      // What is held then comes at once, by the worker.
      await reviewer.caller.put('/me/mail-choice', { ...choice, timing: 'atOnce' }).expect(200);
      await until(() => someoneWaits(server.db));
      await server.kill();
    });
    expect(copiesOf('held the')).toEqual([]);
    await restart();
    await until(() => copiesOf('held the first').length > 0);
    await allSent();
    for (const text of ['held the first', 'held the second']) expect(copiesOf(text)).toHaveLength(1);
    const [digest] = receivedFor(reviewer).slice(-1);
    expect(digest?.subject).toMatch(/^Daily digest of .*: 2 notices$/);
    const stops = digest?.headerLines.find(({ key }) => key === 'list-unsubscribe-post');
    expect(stops?.line).toBe('List-Unsubscribe-Post: List-Unsubscribe=One-Click');
  }, 60_000);
});

describe('after all of it', () => {
  it('every mail of the outbox has arrived, under its own Message-ID and no other', async () => {
    const rows: Array<{ message_id: string; state: string }> = await server.db.query(
      'SELECT message_id, state FROM outbox_mail',
    );
    const sent = rows.filter(({ state }) => state === 'sent').map((row) => row.message_id);
    expect(new Set(smtp.received.map(({ messageId }) => messageId))).toEqual(new Set(sent));
    expect(
      rows
        .map(({ state }) => state)
        .sort()
        .slice(0, 2),
    ).toEqual(['inDigest', 'inDigest']);
  });

  it('the chain of revisions is whole', async () => {
    const rows: Array<{ payload_hash: string; previous_hash: string | null }> = await server.db.query(
      'SELECT payload_hash, previous_hash FROM revision ORDER BY number',
    );
    expect(rows.map((row) => row.previous_hash)).toEqual([
      null,
      ...rows.slice(0, -1).map((row) => row.payload_hash),
    ]);
  });
});
