import { faults, StartFault, say, sentenceFor } from './messages.mjs';

/**
 * The orderly end of a start script: what was started is stopped in the reverse order, whether the end comes
 * from a signal, a fault or the server's own stop.
 */
export class Life {
  /** @type {Array<() => void | Promise<void>>} */
  #endings = [];
  /** @type {(reason: string) => void} */
  #askToEnd = () => {};
  #ending = false;

  /** Settles when someone asks for the end. */
  asked = new Promise((resolve) => {
    this.#askToEnd = resolve;
  });

  constructor() {
    for (const signal of /** @type {const} */ (['SIGINT', 'SIGTERM', 'SIGHUP'])) {
      process.on(signal, () => this.end());
    }
  }

  /** Until the present step is over nothing happens: a database half started could not be stopped. */
  end() {
    if (this.#ending) return;
    this.#ending = true;
    say('Stopping.');
    this.#askToEnd('asked');
  }

  get isEnding() {
    return this.#ending;
  }

  /** @template T @param {Promise<T>} step @returns {Promise<T>} */
  async step(step) {
    const result = await step;
    this.check();
    return result;
  }

  /** Breaks off a start that is no longer wanted. */
  check() {
    if (this.#ending) throw new Interrupted();
  }

  /** @param {() => void | Promise<void>} ending */
  atEnd(ending) {
    this.#endings.push(ending);
  }

  async runEndings() {
    for (const ending of this.#endings.reverse()) await ending();
    this.#endings = [];
  }
}

/** A start broken off by its own user is no fault. */
export class Interrupted extends StartFault {}

/**
 * Runs a start script from beginning to end and gives its exit code to the system.
 * @param {string} storageDir
 * @param {(life: Life) => Promise<number>} main
 */
export async function live(storageDir, main) {
  const life = new Life();
  let code = 0;
  try {
    code = await main(life);
  } catch (error) {
    // A Ctrl-C also reaches the program that was waited for; that it ended is then no fault.
    if (!(error instanceof Interrupted) && !life.isEnding) {
      process.stderr.write(`${sentenceFor(error, storageDir)}\n`);
      if (process.env.LOG_LEVEL === 'debug') console.error(error);
      code = 1;
    }
  }
  await life.runEndings().catch((error) => {
    process.stderr.write(`${faults.endingFailed(sentenceFor(error, storageDir)).message}\n`);
    code = 1;
  });
  process.exit(code);
}
