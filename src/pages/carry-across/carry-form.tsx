import { type FormEvent, useState } from 'react';
import { Button } from '#client/components/button.tsx';
import { CheckField, TextField } from '#client/components/field.tsx';
import { carryAcrossText as text } from '#client/text/carry-across.ts';
import type { NetSummary } from '#shared/contract/drawings.ts';

interface CarryFormProps {
  sectionName: string;
  nets: readonly NetSummary[];
  ready: boolean;
  busy: boolean;
  onSubmit: (name: string, netIds: readonly string[]) => void;
}

/** What the section is called on the new sheet, and which of its nets go along. */
export function CarryForm({ sectionName, nets, ready, busy, onSubmit }: CarryFormProps) {
  const [name, setName] = useState(sectionName);
  const [left, setLeft] = useState<ReadonlySet<string>>(new Set());
  const toggle = (id: string, carried: boolean) => {
    const now = new Set(left);
    if (carried) now.delete(id);
    else now.add(id);
    setLeft(now);
  };
  const submit = (event: FormEvent) => {
    event.preventDefault();
    const netIds = nets.filter((net) => !left.has(net.id)).map((net) => net.id);
    onSubmit(name.trim(), netIds);
  };
  return (
    <form className="flex flex-col gap-3 px-3.5 py-3" onSubmit={submit}>
      <TextField
        label={text.sectionName}
        value={name}
        required
        maxLength={200}
        onChange={(event) => setName(event.target.value)}
      />
      {nets.length > 0 ? (
        <fieldset className="m-0 border-0 p-0">
          <legend className="mb-1 text-sm font-semibold">{text.nets}</legend>
          {nets.map((net) => (
            <CheckField
              key={net.id}
              label={net.name}
              checked={!left.has(net.id)}
              onChange={(event) => toggle(net.id, event.target.checked)}
            />
          ))}
          <p className="mt-2 mb-0 text-sm text-ink-2">{text.preview}</p>
        </fieldset>
      ) : null}
      <div>
        <Button look="main" type="submit" busy={busy} disabled={!ready || name.trim() === ''}>
          {text.carry}
        </Button>
      </div>
    </form>
  );
}
