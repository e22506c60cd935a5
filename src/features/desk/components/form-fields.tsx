import type { ReactNode } from 'react';
import { NumberField, SelectField, TextField } from '#client/components/field.tsx';
import { useTypedNumber } from './use-typed-number.ts';
import { useTypedText } from './use-typed-text.ts';

interface FigureProps {
  label: ReactNode;
  hint?: ReactNode;
  unit?: ReactNode;
  value: number | null;
  optional?: boolean;
  positive?: boolean;
  atLeast?: { least: number; fault: string };
  within?: { least: number; greatest: number; fault: string };
  most?: number;
  disabled: boolean;
  /** A question about a figure that is taken all the same. */
  question?: string | null;
  onCommit: (value: number | null) => void;
}

/** A figure of the document: taken when the field is left, kept with the reason when it cannot be taken. */
export function Figure({ label, hint, unit, question, disabled, ...typed }: FigureProps) {
  const { error, input } = useTypedNumber(typed);
  const note = question ? <span className="text-attention">{question}</span> : hint;
  return <NumberField label={label} hint={note} unit={unit} error={error} disabled={disabled} {...input} />;
}

/** A figure that has to be given. */
export function NeededFigure({
  onCommit,
  ...rest
}: Omit<FigureProps, 'onCommit' | 'optional'> & { onCommit: (value: number) => void }) {
  return <Figure {...rest} onCommit={(value) => value !== null && onCommit(value)} />;
}

export function Words({
  label,
  hint,
  value,
  maxLength,
  disabled,
  onCommit,
}: {
  label: ReactNode;
  hint?: ReactNode;
  value: string;
  maxLength: number;
  disabled: boolean;
  onCommit: (value: string) => void;
}) {
  const input = useTypedText(value, onCommit);
  return (
    <TextField
      label={label}
      hint={hint}
      maxLength={maxLength}
      disabled={disabled}
      autoComplete="off"
      {...input}
    />
  );
}

/** A choice among named values; the empty name stands for null. */
export function Choice<K extends string>({
  label,
  hint,
  value,
  names,
  disabled,
  onCommit,
}: {
  label: ReactNode;
  hint?: ReactNode;
  value: K;
  names: Readonly<Record<K, string>>;
  disabled: boolean;
  onCommit: (value: K) => void;
}) {
  return (
    <SelectField
      label={label}
      hint={hint}
      value={value}
      disabled={disabled}
      onChange={(event) => onCommit(event.target.value as K)}
    >
      {(Object.keys(names) as K[]).map((key) => (
        <option key={key} value={key}>
          {names[key]}
        </option>
      ))}
    </SelectField>
  );
}
