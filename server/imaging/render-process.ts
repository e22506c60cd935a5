import { type ChildProcess, fork } from 'node:child_process';
import { createRequire } from 'node:module';
import type { Socket } from 'node:net';
import type { Readable } from 'node:stream';
import { fileURLToPath, pathToFileURL } from 'node:url';
import { RENDER_MEMORY_BYTES, RENDER_SECONDS } from '#shared/contract/limits.ts';
import { residentBytes } from './process-memory.ts';
import { RenderRefusal, refusals } from './refusal.ts';
import type {
  FirstView,
  ProbeResult,
  RenderAnswer,
  RenderedRendition,
  RenderedSheet,
  RenderOrder,
  RenderRequest,
  RenditionRequest,
} from './render-types.ts';

export interface RenderLimits {
  memoryBytes: number;
  seconds: number;
  /** Bytes on stdout and stderr after which a file is taken for one that floods the log. */
  logBytes: number;
}

export interface OrderOptions {
  signal?: AbortSignal;
  onProgress?: (share: number) => void;
  /** For a page that takes long, and again when its scan has to be drawn after all; the folder is the caller's to move away. */
  onFirstView?: (view: FirstView) => void;
}

/** A process that draws drawings, started when first needed and again after it had to be ended. */
export interface RenderProcess {
  /** @throws RenderRefusal, AbortError, or Error when the process itself failed */
  probe(file: string, options?: OrderOptions): Promise<ProbeResult>;
  renderSheet(request: RenderRequest, options?: OrderOptions): Promise<RenderedSheet>;
  /** Highest resident memory seen during the last order, in bytes. */
  peakBytes(): number;
  close(): void;
}

/** The same process as a maker of cleaned-up pictures. */
export interface RenditionProcess extends Pick<RenderProcess, 'peakBytes' | 'close'> {
  /** @throws RenderRefusal, AbortError, or Error when the process itself failed */
  renderRendition(request: RenditionRequest, options?: OrderOptions): Promise<RenderedRendition>;
}

const defaultLimits: RenderLimits = {
  memoryBytes: RENDER_MEMORY_BYTES,
  seconds: RENDER_SECONDS,
  logBytes: 4 * 1024 * 1024,
};
// By its own address: from a bare name Node would look in the folder the server was started in.
const tsxLoader = pathToFileURL(createRequire(import.meta.url).resolve('tsx')).href;
const plainPackages = new URL('./plain-packages.mjs', import.meta.url).href;
const POLL_MS = 200;
const KEPT_LOG = 8 * 1024;

export function createRenderProcess(
  limits: Partial<RenderLimits> = {},
  childFile?: string,
): RenderProcess & RenditionProcess {
  return new ForkedRenderProcess({ ...defaultLimits, ...limits }, childFile);
}

class ForkedRenderProcess implements RenderProcess, RenditionProcess {
  readonly #limits: RenderLimits;
  readonly #childFile: string;
  #child: ChildProcess | null = null;
  #log = '';
  #logBytes = 0;
  #peak = 0;
  #lastId = 0;
  #last: Promise<unknown> = Promise.resolve();

  constructor(limits: RenderLimits, childFile?: string) {
    this.#limits = limits;
    this.#childFile = childFile ?? fileURLToPath(new URL('./render-child.ts', import.meta.url));
  }

  async probe(file: string, options?: OrderOptions): Promise<ProbeResult> {
    const answer = await this.#inTurn((id) => ({ id, kind: 'probe', file }), options);
    if (answer.kind !== 'probed') throw new Error(`unexpected answer: ${answer.kind}`);
    return answer.result;
  }

  async renderSheet(request: RenderRequest, options?: OrderOptions): Promise<RenderedSheet> {
    const answer = await this.#inTurn((id) => ({ id, kind: 'render', request }), options);
    if (answer.kind !== 'rendered') throw new Error(`unexpected answer: ${answer.kind}`);
    return answer.result;
  }

  async renderRendition(request: RenditionRequest, options?: OrderOptions): Promise<RenderedRendition> {
    const answer = await this.#inTurn((id) => ({ id, kind: 'rendition', request }), options);
    if (answer.kind !== 'renditionMade') throw new Error(`unexpected answer: ${answer.kind}`);
    return answer.result;
  }

  peakBytes(): number {
    return this.#peak;
  }

  close(): void {
    this.#child?.kill('SIGKILL');
    this.#child = null;
  }

  /** One order at a time, so that memory and time are those of one page. */
  #inTurn(toOrder: (id: number) => RenderOrder, options: OrderOptions = {}): Promise<RenderAnswer> {
    const run = () => this.#give(toOrder(++this.#lastId), options);
    const result = this.#last.then(run, run);
    this.#last = result.catch(() => undefined);
    return result;
  }

  async #give(order: RenderOrder, options: OrderOptions): Promise<RenderAnswer> {
    const { signal, onProgress, onFirstView } = options;
    signal?.throwIfAborted();
    const child = this.#started();
    keepsParentAlive(child, true);
    this.#peak = 0;
    this.#logBytes = 0;
    this.#log = '';
    const stops: Array<() => void> = [];
    try {
      return await new Promise<RenderAnswer>((resolve, reject) => {
        const end = (reason: Error) => {
          this.close();
          reject(reason);
        };
        stops.push(
          this.#watch(child, end),
          onAbort(signal, () => end(abortReason(signal))),
          onMessage(child, (answer) => {
            if (answer.id !== order.id) return;
            if (answer.kind === 'progress') onProgress?.(answer.share);
            else if (answer.kind === 'firstView') onFirstView?.(answer.view);
            else settle(answer, resolve, reject);
          }),
          onExit(child, (how) => {
            if (this.#child === child) this.#child = null;
            reject(new Error(`the rendering process ended (${how}): ${this.#log.slice(-2000)}`));
          }),
        );
        child.send(order, (error) => error && reject(error));
      });
    } finally {
      for (const stop of stops) stop();
      keepsParentAlive(child, false);
    }
  }

  /** Ends the order when the process takes too much memory, time or log. */
  #watch(child: ChildProcess, end: (reason: Error) => void): () => void {
    const deadline = setTimeout(
      () => end(refusals.tooSlow(this.#limits.seconds)),
      this.#limits.seconds * 1000,
    );
    const poll = setInterval(async () => {
      const bytes = await residentBytes(child.pid ?? 0);
      this.#peak = Math.max(this.#peak, bytes);
      if (bytes > this.#limits.memoryBytes) end(refusals.outOfMemory());
      else if (this.#logBytes > this.#limits.logBytes) end(refusals.flood());
    }, POLL_MS);
    return () => {
      clearTimeout(deadline);
      clearInterval(poll);
    };
  }

  #started(): ChildProcess {
    if (this.#child?.connected) return this.#child;
    const child = fork(this.#childFile, [], {
      execArgv: ['--import', tsxLoader, '--import', plainPackages, '--expose-gc'],
      stdio: ['ignore', 'pipe', 'pipe', 'ipc'],
      // Nothing of the server's environment: no database address, no secret.
      env: {
        PATH: process.env.PATH,
        HOME: process.env.HOME,
        TMPDIR: process.env.TMPDIR,
        VIPS_WARNING: '0',
        // Of the memory that libvips' threads gave back, glibc would keep a pool for each of them.
        MALLOC_ARENA_MAX: '2',
      },
    });
    child.on('error', () => undefined);
    for (const stream of [child.stdout, child.stderr]) if (stream) this.#readLog(stream);
    this.#child = child;
    return child;
  }

  /** Read to the end so that the process does not block, but kept only in part. */
  #readLog(stream: Readable): void {
    stream.on('data', (chunk: Buffer) => {
      this.#logBytes += chunk.length;
      if (this.#log.length < KEPT_LOG) this.#log += chunk.toString('utf8').slice(0, KEPT_LOG);
    });
  }
}

/** An idle process must not keep the server from ending; it ends itself when its parent has gone. */
function keepsParentAlive(child: ChildProcess, isNeeded: boolean): void {
  const handles = [child, child.channel, child.stdout as Socket | null, child.stderr as Socket | null];
  for (const handle of handles) {
    if (isNeeded) handle?.ref();
    else handle?.unref();
  }
}

function settle(
  answer: RenderAnswer,
  resolve: (answer: RenderAnswer) => void,
  reject: (error: Error) => void,
): void {
  if (answer.kind === 'refused') reject(new RenderRefusal(answer.refusal.code, answer.refusal.message));
  else if (answer.kind === 'failed') reject(new Error(`rendering failed: ${answer.message}`));
  else resolve(answer);
}

function abortReason(signal: AbortSignal | undefined): Error {
  return signal?.reason instanceof Error
    ? signal.reason
    : new DOMException('rendering was stopped', 'AbortError');
}

function onAbort(signal: AbortSignal | undefined, act: () => void): () => void {
  signal?.addEventListener('abort', act);
  return () => signal?.removeEventListener('abort', act);
}

function onMessage(child: ChildProcess, act: (answer: RenderAnswer) => void): () => void {
  child.on('message', act);
  return () => child.off('message', act);
}

function onExit(child: ChildProcess, act: (how: string) => void): () => void {
  const listener = (code: number | null, signal: string | null) => act(signal ?? `code ${code}`);
  child.on('exit', listener);
  return () => child.off('exit', listener);
}
