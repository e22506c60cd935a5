import { hash } from '@node-rs/argon2';
import { createTransport } from 'nodemailer';
import { v7 as uuidv7 } from 'uuid';
import { MembershipEntity } from '#server/entities/dam-entity.ts';
import { createDataSource } from '#server/entities/data-source.ts';
import { PersonEntity } from '#server/entities/person-entity.ts';
import type { NetDetailDto, NetOp } from '#shared/contract/nets.ts';
import type { SendingDto } from '#shared/contract/revisions.ts';
import { a1Jpeg } from './a1-sheet.ts';
import { type ApiClient, signInAtDam } from './api-client.ts';
import { type Bench, type BenchRow, median, percentile } from './bench.ts';
import { traceBenchNet } from './bench-net.ts';
import { type BenchStand, openBenchStand } from './bench-stand.ts';
import { type MailCatcher, startMailCatcher } from './mail-catcher.ts';
import { uploadSheet } from './upload-sheet.ts';

/** After one that is thrown away. */
const SENDINGS = 20;

/**
 * From asking the API to send a net for checking until a mail server on this machine has the reviewer's mail whole, with
 * the picture of the section. Beside it a bare nodemailer hands a mail of the same size to the same server.
 */
export const mailLatency: Bench = {
  name: 'mail-latency',
  about:
    'until the mail server has the reviewer’s mail after a net of 60 lines on an A1 scan was sent for checking, beside a bare hand-over of a mail of that size',
  async run() {
    const catcher = await startMailCatcher();
    const stand = await openBenchStand({ env: { SMTP_URL: catcher.url } });
    try {
      const client = await signInAtDam(stand);
      const reviewerId = await addReviewer(stand, client.damId);
      const sheet = await uploadSheet(client, await a1Jpeg(), 'a1.jpg');
      const { netId } = await traceBenchNet(client, sheet.id);
      const [own, bare]: [number[], number[]] = [[], []];
      for (let n = 0; n <= SENDINGS; n += 1) {
        await changeNet(client, netId, n + 2);
        own.push(await sendOnce(client, catcher, { netId, reviewerId }));
        bare.push(await handOver(catcher));
      }
      return rows('mail-latency', own.slice(1), bare.slice(1));
    } finally {
      await stand.close();
      await catcher.close();
    }
  },
};

function rows(name: string, own: readonly number[], bare: readonly number[]): BenchRow[] {
  const row = (suffix: string, of: (values: readonly number[]) => number): BenchRow => ({
    name: `${name}${suffix}`,
    value: of(own),
    unit: 'ms',
    reference: of(bare),
    ratio: of(own) / of(bare),
    samples: own.length,
  });
  return [row('', median), row('-p95', (values) => percentile(values, 0.95))];
}

async function addReviewer({ ownerUrl }: BenchStand, damId: string): Promise<string> {
  const id = uuidv7();
  const db = await createDataSource({ url: ownerUrl, poolSize: 1 }).initialize();
  await db.getRepository(PersonEntity).insert({
    id,
    email: `${id}@bench.example`,
    name: 'Reviewer',
    passwordHash: await hash(id),
    admin: false,
  });
  await db.getRepository(MembershipEntity).insert({ damId, personId: id, roles: ['reviewer'] });
  await db.destroy();
  return id;
}

/** Begins a line, since a net that waits as it is is not sent twice; the mail then tells what changed as well. */
async function changeNet(client: ApiClient, netId: string, seq: number): Promise<void> {
  const op: NetOp = {
    op: 'put',
    entityId: uuidv7(),
    baseVersion: 0,
    value: {
      kind: 'line',
      origin: 'traced',
      line: 'equipotential',
      name: '',
      points: [[3, 3]],
      finished: false,
      water: null,
      head: null,
      drops: null,
    },
  };
  await client.post(`/nets/${netId}/commands`, { clientId: uuidv7(), seq, label: 'began a line', ops: [op] });
}

async function sendOnce(
  client: ApiClient,
  catcher: MailCatcher,
  { netId, reviewerId }: { netId: string; reviewerId: string },
): Promise<number> {
  const { open } = await client.get<SendingDto>(`/nets/${netId}/sending`);
  const { changeNumber } = await client.get<NetDetailDto>(`/nets/${netId}`);
  const sending = {
    id: uuidv7(),
    reviewerIds: [reviewerId],
    message: '',
    changeNumber,
    reasons: open.map(({ key }) => ({ key, reason: 'Measured.' })),
  };
  const arrived = catcher.next();
  const began = performance.now();
  await client.post(`/nets/${netId}/revisions`, sending);
  return (await arrived) - began;
}

/** A mail as large as the last one, through a connection of its own as the product's are. */
async function handOver(catcher: MailCatcher): Promise<number> {
  const transport = createTransport({ url: catcher.url });
  const line = `${'measured '.repeat(8)}\r\n`;
  const text = line.repeat(Math.ceil(catcher.lastBytes() / line.length));
  const arrived = catcher.next();
  const began = performance.now();
  await transport.sendMail({ from: 'a@bench.example', to: 'b@bench.example', subject: 'Bare', text });
  transport.close();
  return (await arrived) - began;
}
