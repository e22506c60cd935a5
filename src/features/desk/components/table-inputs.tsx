import { classNames } from '#client/components/class-names.ts';
import { useTypedNumber } from './use-typed-number.ts';
import { useTypedText } from './use-typed-text.ts';

/** Inputs that look like the table's own figures until they are pointed at or hold the focus. */
const IN_TABLE =
  'w-full min-w-[4rem] rounded-sheet border bg-transparent px-1.5 py-px hover:border-edge focus:border-edge focus:bg-white';

/** An empty field shows where it is. */
const edgeOf = (shown: string) => (shown === '' ? 'border-edge' : 'border-transparent');

interface TableNumberProps {
  label: string;
  value: number | null;
  shown: string;
  onCommit: (value: number | null) => void;
  disabled?: boolean;
  /** Whether it may be left empty, which means null. */
  optional?: boolean;
}

/** A figure in a table that is edited where it stands; the reason for refusing it stands below it. */
export function TableNumber({
  label,
  value,
  shown,
  onCommit,
  disabled = false,
  optional = false,
}: TableNumberProps) {
  const { error, input } = useTypedNumber({ value, shown, onCommit, optional });
  return (
    <>
      <input
        type="text"
        autoComplete="off"
        spellCheck={false}
        aria-label={label}
        aria-invalid={error ? true : undefined}
        disabled={disabled}
        className={classNames(IN_TABLE, '-mr-[7px] text-right', error ? 'border-wrong' : edgeOf(shown))}
        {...input}
      />
      {error ? (
        <span role="alert" className="block text-sm text-wrong">
          {error}
        </span>
      ) : null}
    </>
  );
}

export function TableText({
  label,
  value,
  onCommit,
  maxLength,
}: {
  label: string;
  value: string;
  onCommit: (value: string) => void;
  maxLength: number;
}) {
  const input = useTypedText(value, onCommit);
  return (
    <input
      type="text"
      autoComplete="off"
      spellCheck={false}
      aria-label={label}
      maxLength={maxLength}
      className={classNames(IN_TABLE, edgeOf(value), '-ml-[7px] font-semibold')}
      {...input}
    />
  );
}
