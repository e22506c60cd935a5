import { useSuspenseQuery } from '@tanstack/react-query';
import { useMemo } from 'react';
import { Link, useNavigate, useParams, useSearchParams } from 'react-router-dom';
import { Button } from '#client/components/button.tsx';
import { Loading } from '#client/components/loading.tsx';
import { Page } from '#client/components/page.tsx';
import { Empty, Panel } from '#client/components/panel.tsx';
import { damQuery } from '#client/features/dams/api/dam-queries.ts';
import { drawingListQuery } from '#client/features/drawings/api/drawing-queries.ts';
import { type ComparedSide, paths } from '#client/lib/paths.ts';
import { compareText as text } from '#client/text/compare.ts';
import { damsText } from '#client/text/dams.ts';
import type { DrawingDto } from '#shared/contract/drawings.ts';
import { AppFrame } from '../app-frame.tsx';
import { useDamLive } from '../use-dam-live.ts';
import { Compared } from './compared.tsx';
import type { ComparedNet } from './compared-net.ts';
import { parseSide } from './parse-side.ts';
import { SideChoice } from './side-choice.tsx';
import { type LoadedSide, useComparedNet } from './use-compared-net.ts';

/** Two nets of a dam beside one another. Which ones stands in the address, so that it can be shared. */
export function ComparePage() {
  const { damId = '' } = useParams();
  const { data: dam } = useSuspenseQuery(damQuery(damId));
  const { data: drawings } = useSuspenseQuery(drawingListQuery(damId, false));
  const [search] = useSearchParams();
  const navigate = useNavigate();
  useDamLive(damId);
  const sides = { one: parseSide(search.get('one')), other: parseSide(search.get('other')) };
  const one = useComparedNet(sides.one);
  const other = useComparedNet(sides.other);
  const choose = (first: ComparedSide | null, second: ComparedSide | null) =>
    void navigate(paths.compare(damId, first ?? undefined, second ?? undefined), { replace: true });
  const trail = [
    { label: damsText.title, to: paths.dams },
    { label: dam.name, to: paths.dam(dam.id) },
    { label: text.title },
  ];
  return (
    <AppFrame trail={trail}>
      <Page
        title={text.pageTitle(dam.name)}
        heading={text.title}
        lead={text.lead}
        action={
          sides.one && sides.other ? (
            <Button look="quiet" onClick={() => choose(sides.other, sides.one)}>
              {text.swap}
            </Button>
          ) : null
        }
      >
        {hasNets(drawings) ? (
          <div className="flex flex-col gap-5">
            <div className="grid grid-cols-[minmax(0,1fr)] items-start gap-5 md:grid-cols-2">
              <SideChoice
                title={text.one}
                drawings={drawings}
                side={sides.one}
                loaded={one}
                onChoose={(side) => choose(side, sides.other)}
              />
              <SideChoice
                title={text.other}
                drawings={drawings}
                side={sides.other}
                loaded={other}
                onChoose={(side) => choose(sides.one, side)}
              />
            </div>
            <Outcome damId={damId} damName={dam.name} drawings={drawings} sides={[one, other]} />
          </div>
        ) : (
          <Panel title={text.title} look="register">
            <Empty>
              {text.none} <Link to={paths.dam(damId)}>{text.toDam}</Link>
            </Empty>
          </Panel>
        )}
      </Page>
    </AppFrame>
  );
}

const hasNets = (drawings: readonly DrawingDto[]) =>
  drawings.some(({ sections }) => sections.some(({ nets }) => nets.length > 0));

interface OutcomeProps {
  damId: string;
  damName: string;
  drawings: readonly DrawingDto[];
  sides: readonly [LoadedSide, LoadedSide];
}

/** The comparison, or what it still waits for. */
function Outcome({ damId, damName, drawings, sides }: OutcomeProps) {
  const [one, other] = [useFramed(sides[0].net, drawings), useFramed(sides[1].net, drawings)];
  if (sides.some(({ error }) => error)) return null;
  if (sides.some(({ unread }) => unread !== null && unread.damId !== damId))
    return <Said wrong>{text.otherDam}</Said>;
  const failed = sides.find(({ unreadable }) => unreadable);
  if (failed) return <Said wrong>{text.readingFailed(failed.unread?.name ?? '')}</Said>;
  if (one && other) return <Compared damName={damName} one={one} other={other} />;
  if (sides.some(({ asked }) => !asked)) return <Said>{text.chooseBoth}</Said>;
  const read = sides.find(({ unread, net }) => unread !== null && net === null);
  return read?.unread ? <Said>{text.reading(read.unread.name)}</Said> : <Loading />;
}

/** A revision does not say which part of the sheet its section is; the drawing does. */
function useFramed(net: ComparedNet | null, drawings: readonly DrawingDto[]): ComparedNet | null {
  return useMemo(() => {
    const section = drawings.flatMap(({ sections }) => sections).find(({ id }) => id === net?.section.id);
    return net?.frame === null && section ? { ...net, frame: section.frame } : net;
  }, [net, drawings]);
}

function Said({ wrong = false, children }: { wrong?: boolean; children: string }) {
  return (
    <p role={wrong ? 'alert' : 'status'} className={`m-0 px-3.5 py-2 ${wrong ? 'text-wrong' : 'text-ink-2'}`}>
      {children}
    </p>
  );
}
