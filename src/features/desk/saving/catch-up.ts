import type { DeskStore } from '#client/features/desk/model/desk-state.ts';
import type { ChangesDto } from '#shared/contract/nets.ts';

/**
 * Brings the desk up to what others have done, one question at a time; a call during a question makes one more.
 * Failing is no harm: the next event, or the stream's next opening, asks again from the same number.
 */
export function createCatchUp(
  desk: Pick<DeskStore, 'getState' | 'receive'>,
  fetchSince: (since: number) => Promise<ChangesDto>,
): () => Promise<void> {
  let underWay: Promise<void> | null = null;
  let again = false;

  async function catchUp(): Promise<void> {
    do {
      again = false;
      desk.receive(await fetchSince(desk.getState().changeNumber));
    } while (again);
  }

  return () => {
    again = true;
    underWay ??= catchUp().finally(() => {
      underWay = null;
    });
    return underWay;
  };
}
