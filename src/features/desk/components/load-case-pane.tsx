import { type FormEvent, useState } from 'react';
import { useNavigate } from 'react-router-dom';
import { Button, ButtonLink } from '#client/components/button.tsx';
import { TextField } from '#client/components/field.tsx';
import { useNotice } from '#client/components/notice.tsx';
import { ProblemNote } from '#client/components/problem-note.tsx';
import { downloadFrom } from '#client/lib/download.ts';
import { apiUrl } from '#client/lib/http.ts';
import { paths } from '#client/lib/paths.ts';
import { compareText } from '#client/text/compare.ts';
import { deskPageText } from '#client/text/desk-page.ts';
import type { NetDetailDto } from '#shared/contract/nets.ts';
import { useCopyForLoadCase, useRenameLoadCase } from '../api/net-mutations.ts';
import { FormPane } from './form-pane.tsx';

const text = deskPageText.loadCase;

interface LoadCasePaneProps {
  detail: NetDetailDto;
  disabled: boolean;
  /** Sends what waits, so that a copy or a file holds it. */
  flush: () => Promise<void>;
  onClose: () => void;
}

/** The net as one load case of its section: its name, a copy for another one, and the whole of it as a file. */
export function LoadCasePane({ detail, disabled, flush, onClose }: LoadCasePaneProps) {
  const keep = async () => {
    await flush();
    downloadFrom(apiUrl(`/nets/${detail.net.id}/document`));
  };
  const navigate = useNavigate();
  // What stands beside the other net is what the server holds.
  const compare = async () => {
    await flush();
    navigate(paths.compare(detail.dam.id, { kind: 'net', id: detail.net.id }));
  };
  return (
    <FormPane title={text.title} onClose={onClose}>
      <Rename detail={detail} disabled={disabled} />
      <section className="border-t border-rule pt-2">
        <p className="mt-0 mb-2 text-ink-2">{text.drawingLead}</p>
        <ButtonLink to={paths.drawing(detail.drawing.id)}>{text.drawing}</ButtonLink>
      </section>
      {detail.can.includes('net.trace') ? <Copy detail={detail} flush={flush} /> : null}
      <section className="border-t border-rule pt-2">
        <p className="mt-0 mb-2 text-ink-2">{compareText.compareLead}</p>
        <Button onClick={compare}>{compareText.compareThis}</Button>
      </section>
      <section className="border-t border-rule pt-2">
        <h3 className="m-0 text-sm font-semibold">{text.keepTitle}</h3>
        <p className="mt-0 mb-2 text-ink-2">{text.keepLead}</p>
        <Button onClick={keep}>{text.keep}</Button>
      </section>
    </FormPane>
  );
}

function Rename({ detail, disabled }: Pick<LoadCasePaneProps, 'detail' | 'disabled'>) {
  const [name, setName] = useState(detail.net.name);
  const [fault, setFault] = useState<string | null>(null);
  const rename = useRenameLoadCase(detail.net.id);
  const notice = useNotice();
  const submit = (event: FormEvent) => {
    event.preventDefault();
    if (rename.isPending) return;
    if (name.trim() === '') setFault(text.namingNeeded);
    else rename.mutate(name, { onSuccess: () => notice(text.renamed) });
  };
  return (
    <form onSubmit={submit} className="flex flex-col gap-2">
      <ProblemNote error={rename.error} />
      <TextField
        label={text.name}
        value={name}
        maxLength={200}
        disabled={disabled}
        error={fault}
        onChange={(event) => {
          setName(event.target.value);
          setFault(null);
        }}
      />
      {disabled || name === detail.net.name ? null : (
        <div>
          <Button type="submit" busy={rename.isPending}>
            {text.rename}
          </Button>
        </div>
      )}
    </form>
  );
}

function Copy({ detail, flush }: Pick<LoadCasePaneProps, 'detail' | 'flush'>) {
  const [name, setName] = useState('');
  const [fault, setFault] = useState<string | null>(null);
  const copy = useCopyForLoadCase(detail.net.id);
  const navigate = useNavigate();
  const submit = async (event: FormEvent) => {
    event.preventDefault();
    if (copy.isPending) return;
    if (name.trim() === '') return setFault(text.namingNeeded);
    await flush();
    copy.mutate(name, { onSuccess: (net) => navigate(paths.net(net.id)) });
  };
  return (
    <form onSubmit={submit} className="flex flex-col gap-2 border-t border-rule pt-2">
      <h3 className="m-0 text-sm font-semibold">{text.copyTitle}</h3>
      <p className="m-0 text-ink-2">{text.copyLead}</p>
      <ProblemNote error={copy.error} />
      <TextField
        label={text.copyName}
        value={name}
        maxLength={200}
        error={fault}
        onChange={(event) => {
          setName(event.target.value);
          setFault(null);
        }}
      />
      <div>
        <Button type="submit" busy={copy.isPending}>
          {text.copy}
        </Button>
      </div>
    </form>
  );
}
