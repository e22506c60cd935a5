import {
  type InputHTMLAttributes,
  type ReactNode,
  type SelectHTMLAttributes,
  type TextareaHTMLAttributes,
  useId,
} from 'react';
import { classNames } from './class-names.ts';

interface FieldFrame {
  label: ReactNode;
  hint?: ReactNode;
  /** What is wrong and what to do; null when nothing is. */
  error?: ReactNode;
  /** Unit shown behind the input. */
  unit?: ReactNode;
  /** The label is read but not shown, as in a table whose head names the column. */
  labelHidden?: boolean;
  className?: string;
}

export const inputClass = (wrong: boolean) =>
  classNames(
    'w-full min-w-0 rounded-sheet border bg-white px-2 py-[5px] text-base disabled:bg-hover disabled:text-ink-2',
    '[&[readonly]]:bg-hover',
    wrong ? 'border-wrong' : 'border-edge',
  );

interface Wiring {
  id: string;
  'aria-describedby': string | undefined;
  'aria-invalid': true | undefined;
}

/** Label, control, unit, hint and error in their order, wired together for the screen reader. */
export function Field({
  label,
  hint,
  error,
  unit,
  labelHidden,
  className,
  children,
}: FieldFrame & { children: (wiring: Wiring) => ReactNode }) {
  const id = useId();
  const described = [error ? `${id}-error` : null, hint ? `${id}-hint` : null].filter(Boolean).join(' ');
  return (
    <div className={classNames('flex flex-col gap-1', className)}>
      <label htmlFor={id} className={labelHidden ? 'sr-only' : 'text-sm font-semibold'}>
        {label}
      </label>
      <div className="flex items-center gap-2">
        {children({
          id,
          'aria-describedby': described || undefined,
          'aria-invalid': error ? true : undefined,
        })}
        {unit ? <span className="shrink-0 text-ink-2">{unit}</span> : null}
      </div>
      {error ? (
        <p id={`${id}-error`} className="m-0 text-sm text-wrong">
          {error}
        </p>
      ) : null}
      {hint ? (
        <p id={`${id}-hint`} className="m-0 text-sm text-ink-2">
          {hint}
        </p>
      ) : null}
    </div>
  );
}

type Framed<T> = FieldFrame & Omit<T, keyof FieldFrame>;

function splitFrame<T extends FieldFrame>(props: T) {
  const { label, hint, error, unit, labelHidden, className, ...control } = props;
  return { frame: { label, hint, error, unit, labelHidden, className } as FieldFrame, control };
}

export function TextField(props: Framed<InputHTMLAttributes<HTMLInputElement>>) {
  const { frame, control } = splitFrame(props);
  return (
    <Field {...frame}>
      {(wiring) => (
        <input type="text" className={inputClass(Boolean(frame.error))} {...control} {...wiring} />
      )}
    </Field>
  );
}

/** A text input for numbers: typed text is kept as typed, decimal comma included; the caller parses it. */
export function NumberField(props: Framed<InputHTMLAttributes<HTMLInputElement>>) {
  const { frame, control } = splitFrame(props);
  return (
    <Field {...frame}>
      {(wiring) => (
        <input
          type="text"
          inputMode="text"
          autoComplete="off"
          spellCheck={false}
          className={classNames(inputClass(Boolean(frame.error)), 'text-right')}
          {...control}
          {...wiring}
        />
      )}
    </Field>
  );
}

export function TextArea(props: Framed<TextareaHTMLAttributes<HTMLTextAreaElement>>) {
  const { frame, control } = splitFrame(props);
  return (
    <Field {...frame}>
      {(wiring) => (
        <textarea
          rows={3}
          className={classNames(inputClass(Boolean(frame.error)), 'resize-y')}
          {...control}
          {...wiring}
        />
      )}
    </Field>
  );
}

export function SelectField(props: Framed<SelectHTMLAttributes<HTMLSelectElement>>) {
  const { frame, control } = splitFrame(props);
  return (
    <Field {...frame}>
      {(wiring) => <select className={inputClass(Boolean(frame.error))} {...control} {...wiring} />}
    </Field>
  );
}

export function CheckField({
  label,
  hint,
  ...control
}: { label: ReactNode; hint?: ReactNode } & InputHTMLAttributes<HTMLInputElement>) {
  const id = useId();
  return (
    <div className="flex items-start gap-2">
      <input
        type="checkbox"
        id={id}
        aria-describedby={hint ? `${id}-hint` : undefined}
        className="mt-[3px] size-4 shrink-0 accent-ink pointer-coarse:mt-0 pointer-coarse:size-6"
        {...control}
      />
      <div className="min-w-0">
        <label htmlFor={id}>{label}</label>
        {hint ? (
          <p id={`${id}-hint`} className="m-0 text-sm text-ink-2">
            {hint}
          </p>
        ) : null}
      </div>
    </div>
  );
}
