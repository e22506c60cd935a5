import { formatMoment } from '#client/lib/dates.ts';
import { fixedText, plainText, signedText } from '#client/lib/figures.ts';
import { besideText as text } from '#client/text/check-work.ts';
import { type Beside, type BlindRow, compareBlind } from '#shared/compute/blind-reading.ts';
import type { RevisionDto } from '#shared/contract/revisions.ts';
import { DECIMALS, unitNames } from '#shared/text/unit-text.ts';

type Quantity = keyof typeof text.quantities;
const QUANTITIES: readonly Quantity[] = ['offset', 'elevation', 'dropsLost', 'totalHead', 'porePressure'];

/** Readings made blind beside the engineer's frozen figures, as sealed. */
export function BlindBeside({ revision: { review, payload } }: { revision: RevisionDto }) {
  const { unitSystem } = payload.document;
  if (review.blindReadings.length === 0) return null;
  const { length, pressure } = unitNames(unitSystem);
  return (
    <section aria-labelledby="blind-beside" className="border-t border-rule px-3 py-2">
      <h2 id="blind-beside" className="m-0 text-base font-bold">
        {text.title}
      </h2>
      {review.blindReadings.map(({ person, at, reading, hash }) => (
        <div key={hash} className="mb-2">
          <p className="m-0 text-ink-2">{text.by(person.name, formatMoment(at))}</p>
          {reading.drops === null ? null : (
            <p className="m-0">
              {text.drops(plainText(reading.drops), plainText(payload.reading.quantities.drops))}
            </p>
          )}
          <BesideTable
            rows={compareBlind(reading.points, payload.reading.points)}
            unitSystem={unitSystem}
            label={text.by(person.name, formatMoment(at))}
          />
        </div>
      ))}
      <p className="m-0 text-sm text-ink-2">{text.legend(length, pressure)}</p>
    </section>
  );
}

interface BesideTableProps {
  rows: readonly BlindRow[];
  unitSystem: RevisionDto['payload']['document']['unitSystem'];
  label: string;
}

function BesideTable({ rows, unitSystem, label }: BesideTableProps) {
  const head = 'border-b border-rule py-0.5 pl-2 text-right font-semibold';
  return (
    <table aria-label={label} className="w-full border-collapse text-sm tabular-nums">
      <thead>
        <tr>
          <th scope="col" className="border-b border-rule py-0.5 text-left font-semibold">
            {text.point}
          </th>
          <th scope="col" className={head}>
            {text.own}
          </th>
          <th scope="col" className={head}>
            {text.net}
          </th>
          <th scope="col" className={head}>
            {text.difference}
          </th>
        </tr>
      </thead>
      {rows.map((row) => (
        <PointRows key={row.pointId} row={row} unitSystem={unitSystem} />
      ))}
    </table>
  );
}

/** A point has a line for each quantity, its name before the first of them. */
function PointRows({ row, unitSystem }: { row: BlindRow } & Pick<BesideTableProps, 'unitSystem'>) {
  const all = DECIMALS[unitSystem];
  const decimals: Record<Quantity, number> = {
    offset: all.offset,
    elevation: all.elevation,
    dropsLost: all.drops,
    totalHead: all.head,
    porePressure: all.pressure,
  };
  const shown = QUANTITIES.filter((quantity) => row[quantity].own !== null);
  const cell = 'py-0.5 pl-2 text-right';
  return (
    <tbody className="border-b border-rule-2">
      {shown.map((quantity, i) => (
        <tr key={quantity}>
          <th scope="row" className="py-0.5 text-left font-normal">
            {i === 0 ? <b className="font-semibold">{row.name || text.unnamed} </b> : null}
            {text.quantities[quantity]}
          </th>
          <td className={cell}>{fixedText(row[quantity].own, decimals[quantity])}</td>
          <td className={cell}>{fixedText(row[quantity].net, decimals[quantity])}</td>
          <td className={cell}>{signedText(row[quantity].difference, decimals[quantity])}</td>
        </tr>
      ))}
      <Judged figures={row.porePressure} name={text.quantities.porePressure} decimals={all.pressure} />
      <Judged figures={row.totalHead} name={text.quantities.totalHead} decimals={all.head} />
      {row.remark ? (
        <tr>
          <td colSpan={4} className="pb-1 break-words whitespace-pre-line text-ink-2">
            {row.remark}
          </td>
        </tr>
      ) : null}
    </tbody>
  );
}

interface JudgedProps {
  figures: Beside & { plusMinus: number | null; within: boolean | null };
  name: string;
  decimals: number;
}

/** Whether the two readings agree, in words as well as by colour. */
function Judged({ figures: { plusMinus, within }, name, decimals }: JudgedProps) {
  if (within === null || plusMinus === null) return null;
  const half = fixedText(plusMinus, decimals);
  return (
    <tr>
      <td colSpan={4} className={`pb-0.5 text-right ${within ? 'text-good' : 'text-wrong'}`}>
        {name} {within ? text.within(half) : text.beyond(half)}
      </td>
    </tr>
  );
}
