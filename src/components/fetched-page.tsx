import { type ComponentType, lazy, useState } from 'react';

/** A page whose script is fetched when it is first visited. */
export interface Fetchable {
  /** Once it is here. */
  page: ComponentType | null;
  /** Waits for it by suspending. */
  lazy: ComponentType;
  fetch: () => Promise<unknown>;
}

export function fetchable(load: () => Promise<ComponentType>): Fetchable {
  const fetch = async () => {
    made.page = await load();
    return { default: made.page };
  };
  const made: Fetchable = { page: null, lazy: lazy(fetch), fetch };
  return made;
}

/** React holds back for 300 ms what takes the place of a fallback, so that what is here already suspends no more. */
export function FetchedPage({ of }: { of: Fetchable }) {
  const [Page] = useState(() => of.page ?? of.lazy);
  return <Page />;
}
