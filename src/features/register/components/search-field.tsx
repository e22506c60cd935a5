import { type KeyboardEvent, type Ref, useEffect, useState } from 'react';
import { Button } from '#client/components/button.tsx';
import { Field, inputClass } from '#client/components/field.tsx';
import { registerText as text } from '#client/text/register.ts';
import { MAX_SEARCH_LENGTH } from '#shared/contract/register.ts';

/** Milliseconds of rest after which what was typed is searched for. */
const REST_MS = 250;

interface SearchFieldProps {
  inputRef: Ref<HTMLInputElement>;
  /** What is searched for now. */
  searched: string;
  onSearch: (words: string) => void;
}

/** Searches once the typing rests; Enter searches at once, Escape clears. */
export function SearchField({ inputRef, searched, onSearch }: SearchFieldProps) {
  const [typed, setTyped] = useState(searched);
  const [known, setKnown] = useState(searched);
  // The address changed by itself: the way back, or filters that were cleared.
  if (searched !== known) {
    setKnown(searched);
    if (searched !== typed.trim()) setTyped(searched);
  }
  useEffect(() => {
    if (typed.trim() === searched) return;
    const timer = setTimeout(() => onSearch(typed.trim()), REST_MS);
    return () => clearTimeout(timer);
  }, [typed, searched, onSearch]);
  const clear = () => {
    setTyped('');
    onSearch('');
  };
  const onKeyDown = (event: KeyboardEvent) => {
    if (event.key === 'Enter') onSearch(typed.trim());
    if (event.key !== 'Escape' || typed === '') return;
    event.preventDefault();
    clear();
  };
  return (
    <Field label={text.search} hint={text.searchHint}>
      {(wiring) => (
        <>
          <input
            ref={inputRef}
            type="search"
            enterKeyHint="search"
            autoComplete="off"
            spellCheck={false}
            maxLength={MAX_SEARCH_LENGTH}
            aria-keyshortcuts="/"
            // The button beside it says what the browser's own sign only shows.
            className={`${inputClass(false)} [&::-webkit-search-cancel-button]:hidden`}
            value={typed}
            onChange={(event) => setTyped(event.target.value)}
            onKeyDown={onKeyDown}
            {...wiring}
          />
          {typed === '' ? null : (
            <Button look="quiet" className="shrink-0" onClick={clear}>
              {text.clearSearch}
            </Button>
          )}
        </>
      )}
    </Field>
  );
}
