/** Work that is done in the next frame and once in it, however often it falls due. */
export type FrameWork = { due(): void; end(): void };

export function onceAFrame(work: () => void): FrameWork {
  let scheduled = 0;
  return {
    due() {
      if (scheduled !== 0) return;
      scheduled = requestAnimationFrame(() => {
        scheduled = 0;
        work();
      });
    },
    end: () => cancelAnimationFrame(scheduled),
  };
}
