import { type KeyboardEvent, useId, useLayoutEffect, useRef, useState } from 'react';
import { classNames } from '#client/components/class-names.ts';
import { TextArea } from '#client/components/field.tsx';
import { notesText as text } from '#client/text/notes.ts';
import type { PersonRef } from '#shared/contract/common.ts';
import { MAX_NOTE_LENGTH } from '#shared/contract/limits.ts';
import { nameBeingTyped, peopleMeant, withName } from '../model/name-completion.ts';

interface NamingTextAreaProps {
  label: string;
  labelHidden?: boolean;
  hint?: string;
  error: string | null;
  value: string;
  people: readonly PersonRef[];
  onChange: (value: string) => void;
  /** Ctrl and Enter. */
  onSend: () => void;
  /** Escape, when no name is being chosen. */
  onEscape: () => void;
}

/** Names offered at once; typing one letter more leaves few. */
const MOST_OFFERED = 6;

/** A text in which people are named: after @ the names that fit are offered, by arrows and Enter or by a press. */
export function NamingTextArea(props: NamingTextAreaProps) {
  const { value, people, onChange } = props;
  const listId = useId();
  const root = useRef<HTMLDivElement>(null);
  const [caret, setCaret] = useState<number | null>(null);
  const [nextCaret, setNextCaret] = useState<number | null>(null);
  const [picked, setPicked] = useState(0);
  const typed = caret === null ? null : nameBeingTyped(value, caret);
  const offered = typed ? peopleMeant(people, typed.typed).slice(0, MOST_OFFERED) : [];
  const at = Math.min(picked, offered.length - 1);

  useLayoutEffect(() => {
    if (nextCaret === null) return;
    const area = root.current?.querySelector('textarea');
    area?.focus();
    area?.setSelectionRange(nextCaret, nextCaret);
    setNextCaret(null);
  }, [nextCaret]);

  const choose = (person: PersonRef) => {
    if (!typed) return;
    const named = withName(value, typed, person.name);
    onChange(named.text);
    setCaret(null);
    setNextCaret(named.caret);
  };

  /** True when the key belonged to the names offered. */
  const chooseByKey = (event: KeyboardEvent): boolean => {
    const person = offered[at];
    if (!person || event.ctrlKey || event.metaKey) return false;
    if (event.key === 'ArrowDown') setPicked((at + 1) % offered.length);
    else if (event.key === 'ArrowUp') setPicked((at + offered.length - 1) % offered.length);
    else if (event.key === 'Enter' || event.key === 'Tab') choose(person);
    else if (event.key === 'Escape') setCaret(null);
    else return false;
    event.preventDefault();
    event.stopPropagation();
    return true;
  };

  return (
    <div ref={root} className="relative">
      <TextArea
        label={props.label}
        {...(props.labelHidden ? { labelHidden: true } : {})}
        hint={props.hint}
        error={props.error}
        autoFocus
        maxLength={MAX_NOTE_LENGTH}
        value={value}
        aria-autocomplete="list"
        {...(offered.length > 0
          ? { 'aria-controls': listId, 'aria-activedescendant': `${listId}-${at}` }
          : {})}
        onChange={(event) => {
          onChange(event.target.value);
          setCaret(event.target.selectionStart);
          setPicked(0);
        }}
        onBlur={() => setCaret(null)}
        onKeyDown={(event) => {
          if (chooseByKey(event)) return;
          if (event.key === 'Enter' && (event.ctrlKey || event.metaKey)) props.onSend();
          if (event.key === 'Escape') props.onEscape();
        }}
      />
      {offered.length > 0 ? (
        <div
          id={listId}
          role="listbox"
          aria-label={text.names}
          className="absolute inset-x-0 z-20 mt-px rounded-sheet border border-ink bg-film py-1"
        >
          {offered.map((person, index) => (
            <div
              key={person.id}
              id={`${listId}-${index}`}
              role="option"
              tabIndex={-1}
              aria-selected={index === at}
              className={classNames('touch flex items-center px-2 py-1', index === at && 'bg-chosen')}
              // Before the field loses the focus, and the list with it.
              onPointerDown={(event) => {
                event.preventDefault();
                choose(person);
              }}
            >
              {person.name}
            </div>
          ))}
        </div>
      ) : null}
    </div>
  );
}
