import { useInfiniteQuery, useQuery, useQueryClient } from '@tanstack/react-query';
import { useCallback, useRef } from 'react';
import { useSearchParams } from 'react-router-dom';
import { Button } from '#client/components/button.tsx';
import { Loading } from '#client/components/loading.tsx';
import { MoreButton } from '#client/components/more-button.tsx';
import { Page } from '#client/components/page.tsx';
import { Empty, Panel } from '#client/components/panel.tsx';
import { ProblemNote } from '#client/components/problem-note.tsx';
import { damListQuery, memberListQuery } from '#client/features/dams/api/dam-queries.ts';
import { registerKeys, registerQuery } from '#client/features/register/api/register-queries.ts';
import { FilterBar } from '#client/features/register/components/register-filters.tsx';
import { RegisterTable } from '#client/features/register/components/register-table.tsx';
import { SearchField } from '#client/features/register/components/search-field.tsx';
import { useRowKeys } from '#client/features/register/components/use-row-keys.ts';
import {
  type FilterName,
  filtersIn,
  isNarrowed,
  type RegisterFilters,
  withFilter,
} from '#client/features/register/model/register-filters.ts';
import { paths } from '#client/lib/paths.ts';
import { useLive } from '#client/lib/use-live.ts';
import { damsText } from '#client/text/dams.ts';
import { registerText as text } from '#client/text/register.ts';
import { MAX_COUNTED } from '#shared/contract/register.ts';
import { AppFrame } from '../app-frame.tsx';

/** All drawings, sections and nets of the reader's dams, found by words and filters which the address holds. */
export function RegisterPage() {
  const [address, setAddress] = useSearchParams();
  const filters = filtersIn(address);
  const search = useRef<HTMLInputElement>(null);
  useRowKeys(search);
  useRegisterLive();
  const change = useCallback(
    (name: FilterName, value: string) =>
      setAddress((before) => withFilter(before, name, value), { replace: true }),
    [setAddress],
  );
  const onSearch = useCallback((words: string) => change('q', words), [change]);
  return (
    <AppFrame trail={[{ label: damsText.title, to: paths.dams }, { label: text.title }]}>
      <Page title={text.title} heading={text.heading} lead={text.lead}>
        <div className="mb-4 flex flex-col gap-3">
          <SearchField inputRef={search} searched={filters.q ?? ''} onSearch={onSearch} />
          <Filters filters={filters} onChange={change} />
        </div>
        <Found filters={filters} onClear={() => setAddress({}, { replace: true })} />
        <p className="mt-2 mb-0 text-sm text-ink-2 pointer-coarse:hidden">{text.keysHint}</p>
      </Page>
    </AppFrame>
  );
}

interface FiltersProps {
  filters: RegisterFilters;
  onChange: (name: FilterName, value: string) => void;
}

function Filters({ filters, onChange }: FiltersProps) {
  const { data: dams = [] } = useQuery(damListQuery(filters.archived === 'yes'));
  const { data: all = [] } = useQuery({ ...damListQuery(false), enabled: filters.archived === 'yes' });
  const { data: members = [] } = useQuery({
    ...memberListQuery(filters.dam ?? ''),
    enabled: filters.dam !== undefined,
  });
  const known = [...dams, ...all.filter(({ id }) => !dams.some((dam) => dam.id === id))];
  const people = filters.dam === undefined ? [] : members.map(({ person }) => person);
  return <FilterBar filters={filters} dams={known} people={people} onChange={onChange} />;
}

function Found({ filters, onClear }: { filters: RegisterFilters; onClear: () => void }) {
  const query = useInfiniteQuery(registerQuery(filters));
  const rows = query.data?.pages.flatMap((page) => page.items) ?? [];
  const total = query.data?.pages[0]?.total ?? null;
  const found = total === null ? '' : text.rows(text.count(total, MAX_COUNTED));
  return (
    <Panel
      look="register"
      title={text.caption}
      action={
        <span role="status" className="text-ink-2">
          {found}
        </span>
      }
    >
      {query.error ? (
        <div className="p-3.5">
          <ProblemNote error={query.error} />
        </div>
      ) : null}
      {query.isPending ? <Loading /> : null}
      {rows.length > 0 ? <RegisterTable rows={rows} isBusy={query.isPlaceholderData} /> : null}
      {query.data && rows.length === 0 ? <Nothing filters={filters} onClear={onClear} /> : null}
      <MoreButton label={text.more} query={query} />
    </Panel>
  );
}

function Nothing({ filters, onClear }: { filters: RegisterFilters; onClear: () => void }) {
  if (!isNarrowed(filters)) return <Empty>{text.none}</Empty>;
  const isOnlyPutAway = Object.keys(filters).every((name) => name === 'archived' || name === 'sort');
  return (
    <Empty>
      <p className="mt-0 mb-2">{isOnlyPutAway ? text.nonePutAway : text.noMatch}</p>
      <Button look="quiet" onClick={onClear}>
        {text.clear}
      </Button>
    </Empty>
  );
}

/** Loads the register again when others change what it shows; strokes on a net come every second and are left out. */
function useRegisterLive(): void {
  const queryClient = useQueryClient();
  useLive((message) => {
    if (message.type === 'net' || message.type === 'presence') return;
    void queryClient.invalidateQueries({ queryKey: registerKeys.root });
  });
}
