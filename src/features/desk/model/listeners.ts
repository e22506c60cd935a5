/** Those who want to be told of something. */
export type Listeners<T> = {
  tell(value: T): void;
  /** Adds one more; gives a function that takes it out again. */
  add(listener: (value: T) => void): () => void;
  clear(): void;
};

export function createListeners<T>(): Listeners<T> {
  const listeners = new Set<(value: T) => void>();
  return {
    tell(value) {
      for (const listener of listeners) listener(value);
    },
    add(listener) {
      listeners.add(listener);
      return () => {
        listeners.delete(listener);
      };
    },
    clear: () => listeners.clear(),
  };
}
