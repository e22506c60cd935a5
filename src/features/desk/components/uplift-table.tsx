import { fixedText, plusMinusText } from '#client/lib/figures.ts';
import { profileText } from '#client/text/profiles.ts';
import type { UnitSystem } from '#shared/contract/document.ts';
import type { ProfileReading } from '#shared/contract/reading-quantities.ts';
import { unitNames } from '#shared/text/unit-text.ts';
import { FigureCell, MarginTable, RowHead } from './margin-table.tsx';

const text = profileText.uplift;
type Uplift = NonNullable<ProfileReading['uplift']>;

/** Resultant of the water pressure on a base and its line of action: the whole, and its excess over the tailwater. */
export function UpliftTable({ uplift, unitSystem }: { uplift: Uplift; unitSystem: UnitSystem }) {
  const { length } = unitNames(unitSystem);
  const force = text.units[unitSystem];
  const heads = [
    text.part,
    text.resultant(force),
    text.upwards(force),
    text.sideways(force),
    text.acts(length),
    text.arm(length),
  ];
  return (
    <div className="sticky left-0 max-w-[56rem] px-2.5 pb-2 [&_tbody_th]:whitespace-nowrap">
      <h3 className="m-0 text-base font-semibold">{text.title}</h3>
      {uplift.total === null ? null : (
        <MarginTable caption={text.title} heads={heads}>
          <Row name={text.total} part={uplift.total} />
          {uplift.excess === null ? null : <Row name={text.excess} part={uplift.excess} />}
        </MarginTable>
      )}
      <p className={`m-0 py-1 text-sm ${uplift.total === null ? 'text-attention' : 'text-ink-2'}`}>
        {uplift.total !== null && uplift.excess === null ? `${text.noTailwater} ` : null}
        {uplift.note}
      </p>
    </div>
  );
}

function Row({ name, part }: { name: string; part: NonNullable<Uplift['total']> }) {
  return (
    <tr>
      <RowHead>{name}</RowHead>
      <FigureCell look="font-semibold">{plusMinusText(part.size, part.plusMinus, 1)}</FigureCell>
      <FigureCell>{fixedText(part.vertical, 1)}</FigureCell>
      <FigureCell>{fixedText(part.horizontal, 1)}</FigureCell>
      <FigureCell>{fixedText(part.actsAt?.[0] ?? null, 2)}</FigureCell>
      <FigureCell>{fixedText(part.arm, 2)}</FigureCell>
    </tr>
  );
}
