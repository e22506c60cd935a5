import { useMemo, useState } from 'react';
import { Button } from '#client/components/button.tsx';
import { SelectField } from '#client/components/field.tsx';
import { Empty, Panel } from '#client/components/panel.tsx';
import { besideRows } from '#client/features/desk/components/beside-rows.ts';
import type { FigureUnits } from '#client/features/desk/components/figure-unit.ts';
import { downloadText } from '#client/lib/download.ts';
import { localeStore } from '#client/lib/locale.ts';
import { compareText as text } from '#client/text/compare.ts';
import type { GroupKind } from '#shared/compute/compare-figures/figure-types.ts';
import { figuresBeside, type GroupBeside } from '#shared/compute/compare-figures/figures-beside.ts';
import { figuresIn } from '#shared/compute/compare-figures/figures-in.ts';
import { figuresOf } from '#shared/compute/compare-figures/net-figures.ts';
import type { UnitSystem } from '#shared/contract/document.ts';
import { BYTE_ORDER_MARK, csvText } from '#shared/text/csv.ts';
import { cleanFileName } from '#shared/text/file-name.ts';
import { compareCautions, haveSameDatum } from './compare-cautions.ts';
import { ComparedChanges } from './compared-changes.tsx';
import { type ComparedNet, namedApart } from './compared-net.ts';
import { ComparedPicture } from './compared-picture.tsx';
import { ComparedPoints } from './compared-points.tsx';
import { ComparedTable } from './compared-tables.tsx';

interface ComparedProps {
  damName: string;
  one: ComparedNet;
  other: ComparedNet;
}

/** What two nets say beside one another: cautions, picture, figures, and what was drawn or entered otherwise. */
export function Compared({ damName, ...given }: ComparedProps) {
  const [one, other] = useMemo(() => namedApart(given.one, given.other), [given.one, given.other]);
  const [chosen, setChosen] = useState<UnitSystem | null>(null);
  const unitSystem = chosen ?? one.document.unitSystem;
  const groups = useMemo(() => besideIn(unitSystem, one, other), [unitSystem, one, other]);
  const units = { unitSystem, datum: haveSameDatum(one, other) ? one.document.datum : '' };
  const names = { one: one.name, other: other.name };
  const of = (...kinds: GroupKind[]) => groups.filter(({ kind }) => kinds.includes(kind));
  const points = of('point');
  const others = of('outlet', 'profile');
  return (
    <>
      <Cautions one={one} other={other} />
      <ComparedPicture key={`${one.sheet.id} ${other.sheet.id}`} one={one} other={other} />
      <Panel
        title={text.quantities}
        look="register"
        action={
          <>
            {one.document.unitSystem === other.document.unitSystem ? null : (
              <UnitChoice unitSystem={unitSystem} onChoose={setChosen} />
            )}
            <Button look="quiet" onClick={() => download(damName, groups, units, names)}>
              {text.download}
            </Button>
          </>
        }
      >
        <ComparedTable
          caption={text.quantities}
          groups={of('levels', 'net')}
          units={units}
          names={names}
          titled={false}
        />
      </Panel>
      <Panel title={text.points} look="register">
        {points.length === 0 ? (
          <Empty>{text.noPoints}</Empty>
        ) : (
          <ComparedPoints
            points={points}
            units={units}
            names={names}
            unfinished={{
              one: one.reading.state === 'unfinished',
              other: other.reading.state === 'unfinished',
            }}
          />
        )}
      </Panel>
      {others.length === 0 ? null : (
        <Panel title={text.profiles} look="register">
          <ComparedTable caption={text.profiles} groups={others} units={units} names={names} titled />
        </Panel>
      )}
      <ComparedChanges one={one} other={other} />
      <p className="m-0 text-sm text-ink-2">{text.caution}</p>
    </>
  );
}

/** Places of a profile and exits are known by no name by which another net could have them. */
const COMPARED: readonly GroupKind[] = ['levels', 'net', 'outlet', 'point', 'profile'];

function besideIn(unitSystem: UnitSystem, one: ComparedNet, other: ComparedNet): GroupBeside[] {
  const figures = (net: ComparedNet) =>
    figuresIn(
      unitSystem,
      net.document.unitSystem,
      figuresOf(net).filter(({ kind }) => COMPARED.includes(kind)),
    );
  return figuresBeside(figures(one), figures(other), { unitSystem, sameDatum: haveSameDatum(one, other) });
}

function Cautions({ one, other }: Pick<ComparedProps, 'one' | 'other'>) {
  const units =
    one.document.unitSystem === other.document.unitSystem
      ? []
      : [text.cautions.units(other.name, text.unitSystems[other.document.unitSystem])];
  const said = [...compareCautions(one, other), ...units];
  if (said.length === 0) return null;
  return (
    <ul className="m-0 list-none border border-rule p-0">
      {said.map((caution) => (
        <li key={caution} className="border-l-[3px] border-attention bg-doubt px-3.5 py-1.5 text-attention">
          {caution}
        </li>
      ))}
    </ul>
  );
}

interface UnitChoiceProps {
  unitSystem: UnitSystem;
  onChoose: (unitSystem: UnitSystem) => void;
}

function UnitChoice({ unitSystem, onChoose }: UnitChoiceProps) {
  return (
    <SelectField
      label={text.units}
      labelHidden
      value={unitSystem}
      onChange={({ target }) => onChoose(target.value as UnitSystem)}
    >
      <option value="SI">{text.unitSystems.SI}</option>
      <option value="US">{text.unitSystems.US}</option>
    </SelectField>
  );
}

function download(
  damName: string,
  groups: readonly GroupBeside[],
  units: FigureUnits,
  names: { one: string; other: string },
): void {
  const rows = besideRows(groups, units, { figure: text.figure, difference: text.difference, ...names });
  downloadText(
    BYTE_ORDER_MARK + csvText(rows, localeStore.getState().mark),
    cleanFileName(text.fileName(damName)),
    'text/csv;charset=utf-8',
  );
}
