import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest';
import {
  createRenderProcess,
  type RenderLimits,
  type RenderProcess,
} from '#server/imaging/render-process.ts';
import { pngDrawing } from '#tests/support/drawing-files.ts';

let folder: string;
let png: string;
let open: RenderProcess | undefined;
beforeAll(async () => {
  folder = mkdtempSync(path.join(os.tmpdir(), 'tracehead-process-'));
  png = path.join(folder, 'a.png');
  writeFileSync(png, await pngDrawing());
});
afterEach(() => open?.close());
afterAll(() => rmSync(folder, { recursive: true, force: true }));

function processOf(child: string, limits: Partial<RenderLimits> = {}): RenderProcess {
  open = createRenderProcess(limits, path.join(import.meta.dirname, 'children', `${child}.ts`));
  return open;
}

describe('the rendering process', () => {
  it('is ended when it takes too much memory', async () => {
    const greedy = processOf('greed', { memoryBytes: 300_000_000 });
    await expect(greedy.probe(png)).rejects.toMatchObject({ code: 'out-of-memory' });
    expect(greedy.peakBytes()).toBeGreaterThan(300_000_000);
  });

  it('is ended when it takes too long', async () => {
    await expect(processOf('silence', { seconds: 1 }).probe(png)).rejects.toMatchObject({ code: 'too-slow' });
  });

  it('is ended when it floods the log, of which little is kept', async () => {
    const before = process.memoryUsage.rss();
    await expect(processOf('flood', { logBytes: 50_000_000 }).probe(png)).rejects.toMatchObject({
      code: 'damaged',
      message: expect.stringContaining('warnings without end'),
    });
    expect(process.memoryUsage.rss() - before).toBeLessThan(150_000_000);
  });

  it('is ended when the work is no longer wanted', async () => {
    const stopping = new AbortController();
    setTimeout(() => stopping.abort(), 300);
    await expect(processOf('silence').probe(png, { signal: stopping.signal })).rejects.toMatchObject({
      name: 'AbortError',
    });
  });

  it('that dies is a fault with the end of its log, not a refusal', async () => {
    await expect(processOf('crash').probe(png)).rejects.toThrow(/SIGSEGV.*double free/s);
  });

  it('sees nothing of the server’s environment', async () => {
    process.env.SESSION_SECRET = 'do not tell';
    const seen = await processOf('curious')
      .probe(png)
      .then(String, (error: Error) => error.message);
    delete process.env.SESSION_SECRET;
    expect(Object.keys(JSON.parse(seen)).sort()).not.toContain('SESSION_SECRET');
    expect(seen).not.toContain('do not tell');
  });

  it('works again after it had to be ended', async () => {
    open = createRenderProcess({ seconds: 20 });
    const stopping = new AbortController();
    const first = open.probe(png, { signal: stopping.signal });
    stopping.abort();
    await expect(first).rejects.toThrow();
    expect((await open.probe(png)).pages).toHaveLength(1);
  });

  it('draws what is asked of it one after the other, and tells how far it is', async () => {
    open = createRenderProcess();
    const { kind } = await open.probe(png);
    const shares: number[] = [];
    const sheets = await Promise.all(
      ['one', 'two'].map((name) =>
        open?.renderSheet(
          { file: png, kind, pageNumber: 1, outFolder: path.join(folder, name) },
          { onProgress: (share) => shares.push(share) },
        ),
      ),
    );
    expect(sheets[0]).toEqual(sheets[1]);
    expect(shares.every((share) => share >= 0 && share <= 1)).toBe(true);
  });
});
