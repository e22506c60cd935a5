import { useQuery } from '@tanstack/react-query';
import type { ReactNode } from 'react';
import { Link } from 'react-router-dom';
import { SelectField } from '#client/components/field.tsx';
import { Panel } from '#client/components/panel.tsx';
import { ProblemNote } from '#client/components/problem-note.tsx';
import { revisionListQuery } from '#client/features/revisions/api/revision-queries.ts';
import { type ComparedSide, paths } from '#client/lib/paths.ts';
import { compareText as text } from '#client/text/compare.ts';
import { drawingName } from '#client/text/drawings.ts';
import { checkText } from '#client/text/revisions.ts';
import type { DrawingDto } from '#shared/contract/drawings.ts';
import { sectionLabel, sectionTitle } from '#shared/text/section-title.ts';
import type { LoadedSide } from './use-compared-net.ts';

interface SideChoiceProps {
  title: string;
  drawings: readonly DrawingDto[];
  side: ComparedSide | null;
  loaded: LoadedSide;
  onChoose: (side: ComparedSide | null) => void;
}

/** Which net, and in which state, stands on one side; below it what one has to know of it. */
export function SideChoice({ title, drawings, side, loaded, onChoose }: SideChoiceProps) {
  const netId = side?.kind === 'net' ? side.id : (loaded.unread?.netId ?? '');
  const revisions = useQuery({ ...revisionListQuery(netId), enabled: netId !== '' }).data ?? [];
  return (
    <Panel title={title} look="register">
      <div className="grid gap-x-4 gap-y-2 px-3.5 pt-2.5 pb-3 sm:grid-cols-2">
        <SelectField
          label={text.net}
          value={netId}
          onChange={({ target }) => onChoose(target.value === '' ? null : { kind: 'net', id: target.value })}
        >
          <option value="">{text.noNet}</option>
          <NetOptions drawings={drawings} loaded={loaded} />
        </SelectField>
        <SelectField
          label={text.state}
          value={side?.kind === 'revision' ? side.id : ''}
          disabled={netId === ''}
          onChange={({ target }) =>
            onChoose(
              target.value === '' ? { kind: 'net', id: netId } : { kind: 'revision', id: target.value },
            )
          }
        >
          <option value="">{text.now}</option>
          {revisions.map(({ id, label, state }) => (
            <option key={id} value={id}>
              {text.revision(label, checkText.state[state])}
            </option>
          ))}
        </SelectField>
      </div>
      {loaded.error ? (
        <div className="px-3.5 pb-3">
          <ProblemNote error={loaded.error} />
        </div>
      ) : null}
      {loaded.unread ? <SideFacts loaded={loaded} /> : null}
    </Panel>
  );
}

/** The nets by drawing and section; one that was put away since it was chosen keeps its name. */
function NetOptions({ drawings, loaded: { unread } }: Pick<SideChoiceProps, 'drawings' | 'loaded'>) {
  const sections = drawings.flatMap((drawing) =>
    drawing.sections
      .filter((section) => section.archivedAt === null)
      .map((section) => ({ drawing, section, nets: section.nets.filter((net) => net.archivedAt === null) })),
  );
  const isOffered = sections.some(({ nets }) => nets.some((net) => net.id === unread?.netId));
  return (
    <>
      {sections
        .filter(({ nets }) => nets.length > 0)
        .map(({ drawing, section, nets }) => (
          <optgroup key={section.id} label={`${drawingName(drawing)}, ${sectionTitle(section.name)}`}>
            {nets.map((net) => (
              <option key={net.id} value={net.id}>
                {net.name}
              </option>
            ))}
          </optgroup>
        ))}
      {unread && !isOffered ? <option value={unread.netId}>{text.putAway(unread.netName)}</option> : null}
    </>
  );
}

function SideFacts({ loaded: { unread } }: { loaded: LoadedSide }) {
  if (unread === null) return null;
  const { side, section, drawing, document, engineVersion, state } = unread;
  const { facts } = text;
  const to = side.kind === 'net' ? paths.net(side.id) : paths.revision(side.id);
  return (
    <dl className="m-0 grid grid-cols-[max-content_minmax(0,1fr)] gap-x-3 gap-y-0.5 border-t border-rule-2 px-3.5 py-2 text-sm">
      <Fact name={facts.state}>
        {state}. <Link to={to}>{facts.open}</Link>
      </Fact>
      <Fact name={facts.section}>{sectionLabel(section)}</Fact>
      <Fact name={facts.drawing}>
        {[drawing.number, drawing.revision && `rev ${drawing.revision}`, drawing.title]
          .filter(Boolean)
          .join(' ')}
      </Fact>
      <Fact name={facts.datum}>{document.datum.trim() || facts.noDatum}</Fact>
      <Fact name={facts.units}>{text.unitSystems[document.unitSystem]}</Fact>
      <Fact name={facts.engine}>{engineVersion}</Fact>
    </dl>
  );
}

function Fact({ name, children }: { name: string; children: ReactNode }) {
  return (
    <>
      <dt className="text-ink-2">{name}</dt>
      <dd className="m-0 min-w-0 break-words">{children}</dd>
    </>
  );
}
