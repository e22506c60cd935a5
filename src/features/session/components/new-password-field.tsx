import { TextField } from '#client/components/field.tsx';
import { fieldMessage } from '#client/lib/api-problem.ts';
import { sessionText as text } from '#client/text/session.ts';
import { MAX_PASSWORD_LENGTH, MIN_PASSWORD_LENGTH } from '#shared/contract/limits.ts';

interface NewPasswordFieldProps {
  value: string;
  onChange: (value: string) => void;
  error: unknown;
  /** Name of the field in the request, to find its message. */
  path: string;
  label?: string;
}

export function NewPasswordField({
  value,
  onChange,
  error,
  path,
  label = text.password,
}: NewPasswordFieldProps) {
  return (
    <TextField
      label={label}
      type="password"
      name="new-password"
      autoComplete="new-password"
      required
      minLength={MIN_PASSWORD_LENGTH}
      maxLength={MAX_PASSWORD_LENGTH}
      hint={text.newPasswordHint}
      error={fieldMessage(error, path)}
      value={value}
      onChange={(event) => onChange(event.target.value)}
    />
  );
}
