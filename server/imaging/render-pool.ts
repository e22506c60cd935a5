import type { RenderProcess } from './render-process.ts';

/** Long enough to take several uploads in a row, short enough not to hold memory overnight. */
const IDLE_MS = 60_000;

/** Keeps one rendering process warm between drawings: starting one takes longer than drawing a small scan. */
export interface RenderPool {
  take(): RenderProcess;
  /** After a refusal or a fault the process is ended, so that no file leaves anything behind for the next. */
  giveBack(process: RenderProcess, isSound: boolean): void;
}

export function createRenderPool(create: () => RenderProcess): RenderPool {
  let warm: RenderProcess | null = null;
  let timer: NodeJS.Timeout | undefined;
  return {
    take() {
      clearTimeout(timer);
      const taken = warm ?? create();
      warm = null;
      return taken;
    },
    giveBack(process, isSound) {
      if (!isSound || warm) {
        process.close();
        return;
      }
      warm = process;
      timer = setTimeout(() => {
        warm = null;
        process.close();
      }, IDLE_MS);
      timer.unref();
    },
  };
}
