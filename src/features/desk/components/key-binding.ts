import type { KeyGroup, KeyId } from '#client/text/keys.ts';

/** A key with what is held beside it; signs such as `+` and `?` take Shift or not, as the keyboard has them. */
export type KeyPress = {
  readonly key: string;
  readonly ctrl?: true;
  readonly shift?: true;
  readonly alt?: true;
};

/** What a key does, told by the list of keys and done by the same record. */
export type KeyBinding<Target> = {
  readonly id: KeyId;
  readonly group: KeyGroup;
  readonly presses: readonly KeyPress[];
  /** False when it does not apply now: the next record of the same key is asked. */
  run(target: Target, event: KeyboardEvent): boolean;
};

const ARROWS = ['ArrowLeft', 'ArrowRight', 'ArrowUp', 'ArrowDown'] as const;

/** Left and up are negative, as pixels are. */
export const ARROW_STEPS: Readonly<Record<string, readonly [number, number]>> = {
  ArrowLeft: [-1, 0],
  ArrowRight: [1, 0],
  ArrowUp: [0, -1],
  ArrowDown: [0, 1],
};

export const arrowsWith = (held: Omit<KeyPress, 'key'> = {}): KeyPress[] =>
  ARROWS.map((key) => ({ key, ...held }));

/** Does what the first record does that the key is of and that applies. True when there is one. */
export function runKey<Target>(
  bindings: readonly KeyBinding<Target>[],
  event: KeyboardEvent,
  target: Target,
): boolean {
  return bindings.some(
    ({ presses, run }) => presses.some((press) => isPressed(press, event)) && run(target, event),
  );
}

export function isPressed(press: KeyPress, event: KeyboardEvent): boolean {
  const { key } = event;
  if (press.key !== (key.length === 1 ? key.toLowerCase() : key)) return false;
  if (Boolean(press.ctrl) !== Boolean(event.ctrlKey || event.metaKey)) return false;
  if (Boolean(press.alt) !== Boolean(event.altKey)) return false;
  return isSign(press.key) || Boolean(press.shift) === Boolean(event.shiftKey);
}

/** Signs stand above or below others on the keys of different countries. */
const isSign = (key: string) => key.length === 1 && !/[a-z ]/.test(key);
