import { type InputHTMLAttributes, type ReactNode, useId } from 'react';

/** One of several choices, in a `fieldset` whose `legend` says what is chosen. */
export function RadioField({
  label,
  hint,
  ...control
}: { label: ReactNode; hint?: ReactNode } & InputHTMLAttributes<HTMLInputElement>) {
  const id = useId();
  return (
    <div className="flex items-start gap-2">
      <input
        type="radio"
        id={id}
        aria-describedby={hint ? `${id}-hint` : undefined}
        className="mt-[3px] size-4 shrink-0 accent-ink pointer-coarse:mt-0 pointer-coarse:size-6"
        {...control}
      />
      <div className="min-w-0">
        <label htmlFor={id} className="touch inline-flex items-center">
          {label}
        </label>
        {hint ? (
          <p id={`${id}-hint`} className="m-0 text-sm text-ink-2">
            {hint}
          </p>
        ) : null}
      </div>
    </div>
  );
}
