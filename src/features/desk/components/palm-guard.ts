/** How long after a pen was last seen a touch still counts as the hand that holds it. */
const PEN_LINGERS_MS = 600;
/** A contact wider or taller than this is no fingertip, CSS pixels (about 12 mm). */
const PALM_PX = 70;

export type Contact = {
  readonly pointerId: number;
  readonly pointerType: string;
  readonly width: number;
  readonly height: number;
  readonly timeStamp: number;
};

export type PalmGuard = {
  /** A pen was seen, hovering or down: touches of now are the hand that holds it. Gives those to let go of. */
  penSeen(timeStamp: number): readonly number[];
  /** A touch begins: true when it is a resting palm and means nothing, for as long as it lasts. */
  isPalm(contact: Contact): boolean;
  /** True for a touch that has begun as a palm, or has become one. */
  isIgnored(pointerId: number): boolean;
  /** A touch has begun that means something. */
  began(pointerId: number): void;
  ended(pointerId: number): void;
};

/** Tells fingers from the hand that rests on the glass while its pen draws. */
export function createPalmGuard(): PalmGuard {
  const ignored = new Set<number>();
  const fingers = new Set<number>();
  let penAt = Number.NEGATIVE_INFINITY;
  return {
    penSeen(timeStamp) {
      penAt = timeStamp;
      const palms = [...fingers];
      for (const id of palms) ignored.add(id);
      fingers.clear();
      return palms;
    },
    isPalm({ pointerId, pointerType, width, height, timeStamp }) {
      if (pointerType !== 'touch') return false;
      const palm = timeStamp - penAt < PEN_LINGERS_MS || Math.max(width, height) > PALM_PX;
      if (palm) ignored.add(pointerId);
      return palm;
    },
    isIgnored: (pointerId) => ignored.has(pointerId),
    began: (pointerId) => void fingers.add(pointerId),
    ended(pointerId) {
      ignored.delete(pointerId);
      fingers.delete(pointerId);
    },
  };
}
