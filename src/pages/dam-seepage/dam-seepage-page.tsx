import { useQuery, useQueryClient, useSuspenseQuery } from '@tanstack/react-query';
import { Link, useNavigate, useParams, useSearchParams } from 'react-router-dom';
import { useStore } from 'zustand';
import { Button } from '#client/components/button.tsx';
import { Loading } from '#client/components/loading.tsx';
import { Page } from '#client/components/page.tsx';
import { Empty, Panel } from '#client/components/panel.tsx';
import { ProblemNote } from '#client/components/problem-note.tsx';
import { damQuery } from '#client/features/dams/api/dam-queries.ts';
import { damSeepageKey, damSeepageQuery } from '#client/features/dams/api/dam-seepage-query.ts';
import { FlowUnitField } from '#client/features/desk/components/flow-unit-field.tsx';
import { flowUnitChoice, ownFlowUnit } from '#client/features/desk/model/flow-unit.ts';
import { downloadText } from '#client/lib/download.ts';
import { localeStore } from '#client/lib/locale.ts';
import { paths } from '#client/lib/paths.ts';
import { useLive } from '#client/lib/use-live.ts';
import { damSeepageText as text } from '#client/text/dam-seepage.ts';
import { damsText } from '#client/text/dams.ts';
import type { DamSeepageDto } from '#shared/contract/dam-seepage.ts';
import type { DamDto } from '#shared/contract/dams.ts';
import { BYTE_ORDER_MARK } from '#shared/text/csv.ts';
import { damSeepageCsv } from '#shared/text/dam-seepage-csv.ts';
import { cleanFileName } from '#shared/text/file-name.ts';
import { AppFrame } from '../app-frame.tsx';
import { useDamLive } from '../use-dam-live.ts';
import { LengthTable } from './length-table.tsx';
import { type SectionRow, withNet } from './section-rows.ts';
import { SectionsTable } from './sections-table.tsx';

/** Seepage over a length of dam. Which nets are put together stands in the address, so that it can be shared. */
export function DamSeepagePage() {
  const { damId = '' } = useParams();
  const { data: dam } = useSuspenseQuery(damQuery(damId));
  const [search] = useSearchParams();
  const netIds = (search.get('nets') ?? '')
    .toLowerCase()
    .split(',')
    .filter((each) => each !== '');
  const { data: found, error, isPlaceholderData } = useQuery(damSeepageQuery(damId, netIds));
  useSeepageLive(damId, netIds);
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
          found?.total && !isPlaceholderData ? (
            <Button look="quiet" onClick={() => download(dam, found)}>
              {text.download}
            </Button>
          ) : null
        }
      >
        {found === undefined ? (
          <NothingFound error={error} />
        ) : (
          <Panels found={found} netIds={netIds} isWorkingOut={isPlaceholderData} />
        )}
      </Page>
    </AppFrame>
  );
}

/** Reads again what others change: the dam, its drawings and sections, and every stroke on a net that is chosen. */
function useSeepageLive(damId: string, netIds: readonly string[]): void {
  const queryClient = useQueryClient();
  useDamLive(damId);
  useLive((message) => {
    if (message.type === 'net' && netIds.includes(message.netId))
      void queryClient.invalidateQueries({ queryKey: damSeepageKey(damId) });
  });
}

function download(dam: DamDto, found: DamSeepageDto): void {
  const name = cleanFileName(text.fileName(dam.name));
  downloadText(
    BYTE_ORDER_MARK + damSeepageCsv(found, localeStore.getState().mark),
    name,
    'text/csv;charset=utf-8',
  );
}

function NothingFound({ error }: { error: unknown }) {
  if (!error) return <Loading />;
  return (
    <ProblemNote error={error}>
      <Link to="?">{text.startAgain}</Link>
    </ProblemNote>
  );
}

interface PanelsProps {
  found: DamSeepageDto;
  netIds: readonly string[];
  isWorkingOut: boolean;
}

function Panels({ found, netIds, isWorkingOut }: PanelsProps) {
  const navigate = useNavigate();
  const unit = useStore(flowUnitChoice, (state) => state.unit) ?? ownFlowUnit(found.unitSystem);
  const choose = (row: SectionRow, netId: string | null) => {
    const nets = withNet(netIds, row, netId);
    void navigate({ search: nets.length === 0 ? '' : `?nets=${nets.join(',')}` }, { replace: true });
  };
  if (found.sections.length === 0 && found.chosen.length === 0)
    return (
      <Panel title={text.sections} look="register">
        <Empty>
          {text.none} <Link to={paths.dam(found.damId)}>{text.toDam}</Link>
        </Empty>
      </Panel>
    );
  return (
    <div className="flex flex-col gap-5">
      <Panel title={text.sections} look="register">
        <SectionsTable
          found={found}
          netIds={netIds}
          unit={unit}
          isWorkingOut={isWorkingOut}
          onChoose={choose}
        />
      </Panel>
      <div className="grid grid-cols-[minmax(0,1fr)] items-start gap-5 lg:grid-cols-[minmax(0,1fr)_330px]">
        <Panel title={text.length} look="register">
          {isWorkingOut ? (
            <p role="status" className="m-0 px-3.5 py-4 text-ink-2">
              {text.workingOut}
            </p>
          ) : (
            <LengthTable found={found} unit={unit} />
          )}
        </Panel>
        <div className="flex flex-col gap-3">
          <FlowUnitField unitSystem={found.unitSystem} />
          <p className="m-0 text-sm text-ink-2">{text.caution}</p>
        </div>
      </div>
    </div>
  );
}
