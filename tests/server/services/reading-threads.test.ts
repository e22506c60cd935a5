import { describe, expect, it } from 'vitest';
import { readInThread } from '#server/services/reading-threads.ts';
import { readNet } from '#shared/compute/read-net.ts';
import { finishedDocument } from '#tests/support/net-fixture.ts';

describe('reading a net in a thread', () => {
  it('gives what reading it here gives', async () => {
    const document = finishedDocument();
    expect(await readInThread(document)).toEqual(readNet(document));
  });

  it('gives up in time what takes too long, answers others meanwhile, and reads on afterwards', async () => {
    let ticks = 0;
    const clock = setInterval(() => {
      ticks += 1;
    }, 20);
    const given = readInThread(finishedDocument(40_000), 500).catch((error) => error);
    await readInThread(finishedDocument());
    expect(await given).toMatchObject({ code: 'net-unfinished', status: 422 });
    clearInterval(clock);
    expect(ticks).toBeGreaterThan(5);
    expect((await readInThread(finishedDocument())).state).toBe('read');
  });

  it('reads many at once', async () => {
    const readings = await Promise.all(Array.from({ length: 7 }, () => readInThread(finishedDocument())));
    expect(readings.map((reading) => reading.state)).toEqual(Array.from({ length: 7 }, () => 'read'));
  });
});
