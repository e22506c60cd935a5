import { createServer, type RequestListener, type Server } from 'node:http';
import net, { type AddressInfo } from 'node:net';
import { describe, expect, it } from 'vitest';
import { orderlyStop } from '#server/orderly-stop.ts';

async function serve(listener: RequestListener) {
  const server: Server = createServer(listener);
  const stop = orderlyStop(server);
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
  const { port } = server.address() as AddressInfo;
  return { stop, port, address: `http://127.0.0.1:${port}` };
}

const tookMs = async (work: Promise<void>) => {
  const began = performance.now();
  await work;
  return performance.now() - began;
};

describe('the orderly stop of the server', () => {
  it('does not wait for a connection that never asked anything', async () => {
    const { stop, port } = await serve((_req, res) => res.end());
    const silent = net.connect(port, '127.0.0.1').on('error', () => {});
    await new Promise((resolve) => silent.once('connect', resolve));
    expect(await tookMs(stop(5_000))).toBeLessThan(1_000);
  });

  it('does not wait for one that is kept open between requests', async () => {
    const { stop, address } = await serve((_req, res) => res.end('done'));
    await (await fetch(address)).text();
    expect(await tookMs(stop(5_000))).toBeLessThan(1_000);
  });

  it('lets a request in flight finish, and takes no new one', async () => {
    const { stop, address } = await serve((_req, res) => {
      res.write('first half, ');
      setTimeout(() => res.end('second half'), 300);
    });
    const answer = await fetch(address);
    const stopped = stop(5_000);
    await expect(fetch(address)).rejects.toThrow();
    expect(await answer.text()).toBe('first half, second half');
    expect(await tookMs(stopped)).toBeLessThan(2_000);
  });

  it('ends live streams at once', async () => {
    const { stop, address } = await serve((_req, res) => {
      res.writeHead(200, { 'Content-Type': 'text/event-stream' });
      res.write('data: hello\n\n');
    });
    const stream = await fetch(address, { headers: { Accept: 'text/event-stream' } });
    expect(await tookMs(stop(5_000))).toBeLessThan(1_000);
    expect(await stream.text()).toBe('data: hello\n\n');
  });

  it('cuts a request that outlasts its grace', async () => {
    const { stop, address } = await serve((_req, res) => res.write('never ends'));
    const answer = await fetch(address);
    expect(await tookMs(stop(200))).toBeLessThan(2_000);
    await expect(answer.text()).rejects.toThrow();
  });
});
