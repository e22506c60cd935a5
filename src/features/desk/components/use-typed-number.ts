import { useLayoutEffect, useRef, useState } from 'react';
import { enteredText as asEntered } from '#client/lib/figures.ts';
import { numberFault } from '#client/lib/number-fault.ts';
import { parseTypedNumber } from '#client/lib/parse-number.ts';
import { typedNumberText as text } from '#client/text/schedule.ts';
import { MAX_FIGURE } from '#shared/contract/limits.ts';

interface TypedNumber {
  value: number | null;
  onCommit: (value: number | null) => void;
  /** Whether the field may be left empty, which means null. */
  optional?: boolean;
  positive?: boolean;
  /** Least value that can be taken, with the sentence that says so. */
  atLeast?: { least: number; fault: string };
  /** Least and greatest value that can be taken, with the sentence that says so. */
  within?: { least: number; greatest: number; fault: string };
  /** Greatest size of a value that can be taken. */
  most?: number;
  /** How the value is shown while nobody types; the figure as entered by default. */
  shown?: string;
}

/**
 * A figure being typed: what is typed stays as typed until it can be taken, and what cannot be taken stays with the
 * reason beside it. Taken when the field is left or Enter is pressed; Escape brings the old figure back.
 */
export function useTypedNumber({
  value,
  onCommit,
  optional = false,
  positive = false,
  atLeast,
  within,
  most = MAX_FIGURE,
  shown,
}: TypedNumber) {
  const [typed, setTyped] = useState<string | null>(null);
  const [error, setError] = useState<string | null>(null);
  const justEntered = useRef<HTMLInputElement | null>(null);
  // The figure as entered may be written otherwise than as shown, and with it goes what Tab had chosen: what is typed
  // next would be added to the old figure instead of taking its place.
  useLayoutEffect(() => {
    justEntered.current?.select();
    justEntered.current = null;
  });

  function commit(): void {
    if (typed === null) return;
    if (typed === asEntered(value)) {
      take(value);
      return;
    }
    const { parsed, fault } = parse(typed);
    if (fault) setError(fault);
    else take(parsed);
  }

  function parse(entered: string): { parsed: number | null; fault: string | null } {
    if (entered.trim() === '') return { parsed: null, fault: optional ? null : text.needed };
    const parsed = parseTypedNumber(entered);
    if (parsed === null) return { parsed, fault: numberFault(entered) };
    if (Math.abs(parsed) > most) return { parsed, fault: text.tooLarge };
    if (within && (parsed < within.least || parsed > within.greatest)) return { parsed, fault: within.fault };
    if (positive && parsed <= 0) return { parsed, fault: text.mustBePositive };
    return { parsed, fault: atLeast && parsed < atLeast.least ? atLeast.fault : null };
  }

  function take(next: number | null): void {
    setTyped(null);
    setError(null);
    if (next !== value) onCommit(next);
  }

  return {
    error,
    input: {
      value: typed ?? shown ?? asEntered(value),
      onFocus: ({ currentTarget }: { currentTarget: HTMLInputElement }) => {
        if (typed !== null) return;
        justEntered.current = currentTarget;
        setTyped(asEntered(value));
      },
      onChange: (event: { target: { value: string } }) => {
        setTyped(event.target.value);
        setError(null);
      },
      onBlur: commit,
      onKeyDown: (event: { key: string; preventDefault(): void; stopPropagation(): void }) => {
        if (event.key === 'Enter') {
          event.preventDefault();
          commit();
        }
        if (event.key === 'Escape' && typed !== null && typed !== asEntered(value)) {
          event.stopPropagation();
          // Else the dialog around it would close too.
          event.preventDefault();
          setTyped(asEntered(value));
          setError(null);
        }
      },
    },
  };
}
