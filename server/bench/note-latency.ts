import { hash } from '@node-rs/argon2';
import { v7 as uuidv7 } from 'uuid';
import { MembershipEntity } from '#server/entities/dam-entity.ts';
import { createDataSource } from '#server/entities/data-source.ts';
import { PersonEntity } from '#server/entities/person-entity.ts';
import type { NoteDto } from '#shared/contract/notes.ts';
import { type ApiClient, signInAtDam } from './api-client.ts';
import { type Bench, type BenchRow, percentile } from './bench.ts';
import { type BenchStand, openBenchStand } from './bench-stand.ts';
import { addSheet } from './schedule-api.ts';

const PEOPLE = 50;
const NOTES = 40;
/** Between two notes: a lively net, and time for each to be read before the next. */
const PAUSE_MS = 500;
/** After which a note that somebody still lacks counts as lost. */
const LOST_MS = 30_000;
const PASSWORD = 'measured, not guessed';

/** From sending a note until everybody else on the net has it, over the live stream and by asking for the notes. */
export const noteLatency: Bench = {
  name: 'note-latency',
  about: `until each of ${PEOPLE} people on one net has a note that one of them writes`,
  async run() {
    const stand = await openBenchStand();
    const followers: Follower[] = [];
    try {
      const writer = await signInAtDam(stand);
      const netId = await addNet(stand, writer);
      for (const email of await addPeople(stand, writer.damId))
        followers.push(await followNet(stand.address, netId, email));
      return rowsOf(await writeNotes(writer, netId, followers));
    } finally {
      for (const follower of followers) follower.leave();
      await stand.close();
    }
  },
};

function rowsOf(latencies: readonly number[]): BenchRow[] {
  const row = (name: string, value: number): BenchRow => ({
    name,
    value,
    unit: 'ms',
    reference: null,
    ratio: null,
    samples: latencies.length,
  });
  return [
    row('note-latency', percentile(latencies, 0.95)),
    row('note-latency-worst', Math.max(...latencies)),
  ];
}

async function addNet(stand: BenchStand, client: ApiClient): Promise<string> {
  const sheetId = await addSheet(stand, client);
  const [sectionId, netId] = [uuidv7(), uuidv7()];
  await client.post(`/sheets/${sheetId}/sections`, { id: sectionId, name: 'A', chainage: '', frame: null });
  await client.post(`/sections/${sectionId}/nets`, { id: netId, name: 'Bench' });
  return netId;
}

/** All but the one who writes. */
async function addPeople({ ownerUrl }: BenchStand, damId: string): Promise<string[]> {
  const passwordHash = await hash(PASSWORD);
  const db = await createDataSource({ url: ownerUrl, poolSize: 1 }).initialize();
  const emails: string[] = [];
  for (let n = 1; n < PEOPLE; n += 1) {
    const id = uuidv7();
    const email = `${id}@bench.example`;
    await db
      .getRepository(PersonEntity)
      .insert({ id, email, name: `Reader ${n}`, passwordHash, admin: false });
    await db.getRepository(MembershipEntity).insert({ damId, personId: id, roles: ['colleague'] });
    emails.push(email);
  }
  await db.destroy();
  return emails;
}

interface Follower {
  /** When each note was there, by its id. */
  seenAt: Map<string, number>;
  leave: () => void;
}

/** One reader with a session of their own, who asks for the notes whenever the stream says that there is news. */
async function followNet(address: string, netId: string, email: string): Promise<Follower> {
  const call = await signIn(address, email);
  const end = new AbortController();
  const seenAt = new Map<string, number>();
  const read = async () => {
    const { items } = (await (await call('GET', `/nets/${netId}/notes`)).json()) as { items: NoteDto[] };
    const now = performance.now();
    for (const note of items) if (!seenAt.has(note.id)) seenAt.set(note.id, now);
  };
  const stream = await call('GET', '/live', undefined, end.signal);
  void listen(stream, read).catch((error: unknown) => {
    if (!end.signal.aborted) console.error(error);
  });
  return { seenAt, leave: () => end.abort() };
}

async function listen(stream: Response, read: () => Promise<void>): Promise<void> {
  const decoder = new TextDecoder();
  let rest = '';
  for await (const bytes of stream.body as unknown as AsyncIterable<Uint8Array>) {
    const blocks = (rest + decoder.decode(bytes, { stream: true })).split('\n\n');
    rest = blocks.pop() ?? '';
    if (blocks.some((block) => block.startsWith('event: notes\n'))) await read();
  }
}

async function signIn(address: string, email: string) {
  let [cookie, csrfToken] = ['', ''];
  const call = async (method: string, path: string, body?: object, signal?: AbortSignal) => {
    const response = await fetch(`${address}/api/v1${path}`, {
      method,
      headers: { cookie, 'X-CSRF-Token': csrfToken, 'Content-Type': 'application/json' },
      ...(body ? { body: JSON.stringify(body) } : {}),
      ...(signal ? { signal } : {}),
    });
    const set = response.headers.getSetCookie()[0];
    if (set) cookie = set.split(';')[0] ?? cookie;
    if (!response.ok) throw new Error(`${method} ${path} answered ${response.status}`);
    return response;
  };
  const session = (await (await call('GET', '/session')).json()) as { csrfToken: string };
  csrfToken = session.csrfToken;
  await call('POST', '/session', { email, password: PASSWORD });
  return call;
}

const pause = (ms: number) => new Promise((resolve) => setTimeout(resolve, ms));

async function writeNotes(
  writer: ApiClient,
  netId: string,
  followers: readonly Follower[],
): Promise<number[]> {
  const sentAt = new Map<string, number>();
  for (let n = 0; n < NOTES; n += 1) {
    const id = uuidv7();
    sentAt.set(id, performance.now());
    await writer.post(`/nets/${netId}/notes`, { id, anchor: { on: 'drawing' }, text: `Note ${n}` });
    await pause(PAUSE_MS);
  }
  const deadline = performance.now() + LOST_MS;
  while (followers.some((each) => each.seenAt.size < NOTES)) {
    if (performance.now() > deadline) throw new Error('A note did not reach everybody.');
    await pause(20);
  }
  return followers.flatMap((each) =>
    [...sentAt].map(([id, at]) => (each.seenAt.get(id) ?? Number.POSITIVE_INFINITY) - at),
  );
}
