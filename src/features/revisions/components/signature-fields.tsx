import { TextField } from '#client/components/field.tsx';
import { ApiProblem } from '#client/lib/api-problem.ts';
import { checkText as text } from '#client/text/revisions.ts';

export interface Signature {
  capacity: string;
  password: string;
}
export const UNSIGNED: Signature = { capacity: '', password: '' };

/** Whether both are typed; what is wrong with the password only the server knows. */
export const isSigned = ({ capacity, password }: Signature) => capacity.trim() !== '' && password !== '';

interface SignatureFieldsProps {
  signature: Signature;
  /** Marks what is missing, once signing was tried. */
  asked: boolean;
  error: unknown;
  onChange: (signature: Signature) => void;
}

/** In what capacity, and the password again: a session left open signs nothing. */
export function SignatureFields({ signature, asked, error, onChange }: SignatureFieldsProps) {
  const { capacity, password } = signature;
  return (
    <>
      <TextField
        label={text.capacity}
        hint={text.capacityHint}
        error={asked && capacity.trim() === '' ? text.capacityNeeded : null}
        autoComplete="organization-title"
        maxLength={200}
        value={capacity}
        onChange={(event) => onChange({ ...signature, capacity: event.target.value })}
      />
      <TextField
        label={text.password}
        type="password"
        autoComplete="current-password"
        error={asked && password === '' ? text.passwordNeeded : wrongPassword(error)}
        value={password}
        onChange={(event) => onChange({ ...signature, password: event.target.value })}
      />
    </>
  );
}

function wrongPassword(error: unknown): string | null {
  const errors = error instanceof ApiProblem ? (error.problem.errors ?? []) : [];
  return errors.find(({ path }) => path === 'password')?.message ?? null;
}
