import type { PersonRef } from '#shared/contract/common.ts';

/** A name that is being typed after @: where it begins and what of it is there. */
export interface NameTyped {
  start: number;
  typed: string;
}

/** Longest stretch after @ in which a name is looked for. */
const LONGEST = 60;

/** The name being typed just before the caret; null when none is. */
export function nameBeingTyped(text: string, caret: number): NameTyped | null {
  const start = text.lastIndexOf('@', caret - 1);
  if (start < 0 || caret - start > LONGEST) return null;
  if (start > 0 && /[\p{L}\p{N}_]/u.test(text.charAt(start - 1))) return null;
  const typed = text.slice(start + 1, caret);
  return /[\n@]/.test(typed) ? null : { start, typed };
}

/** People whose name or a part of it begins with what was typed, and is not typed whole yet. */
export function peopleMeant(people: readonly PersonRef[], typed: string): PersonRef[] {
  const begun = typed.toLowerCase();
  return people.filter(({ name }) => {
    const whole = name.toLowerCase();
    return (
      whole !== begun &&
      (whole.startsWith(begun) || whole.split(/\s+/).some((part) => part.startsWith(begun)))
    );
  });
}

/** The text with the name in place of what was typed of it, and where the caret goes. */
export function withName(text: string, { start, typed }: NameTyped, name: string) {
  const after = text.slice(start + 1 + typed.length);
  const inserted = `@${name}${after.startsWith(' ') ? '' : ' '}`;
  return { text: text.slice(0, start) + inserted + after, caret: start + inserted.length };
}
