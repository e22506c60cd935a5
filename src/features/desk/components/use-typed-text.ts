import { useState } from 'react';

/** A text being typed: taken when the field is left or Enter is pressed; Escape brings the old one back. */
export function useTypedText(value: string, onCommit: (value: string) => void) {
  const [typed, setTyped] = useState<string | null>(null);

  function commit(): void {
    if (typed === null) return;
    setTyped(null);
    const next = typed.trim();
    if (next !== value) onCommit(next);
  }

  return {
    value: typed ?? value,
    onChange: (event: { target: { value: string } }) => setTyped(event.target.value),
    onBlur: commit,
    onKeyDown: (event: { key: string; preventDefault(): void; stopPropagation(): void }) => {
      if (event.key === 'Enter') commit();
      if (event.key === 'Escape' && typed !== null) {
        event.stopPropagation();
        // Else the dialog around it would close too.
        event.preventDefault();
        setTyped(null);
      }
    },
  };
}
