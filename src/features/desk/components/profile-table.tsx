import { classNames } from '#client/components/class-names.ts';
import { fixedText, plusMinusText } from '#client/lib/figures.ts';
import { profileText as text } from '#client/text/profiles.ts';
import type { FlowNetDocument } from '#shared/contract/document.ts';
import type { ProfileReading, ProfileSample } from '#shared/contract/reading-quantities.ts';
import { DECIMALS, elevationUnit, unitNames } from '#shared/text/unit-text.ts';

const CELL = 'border-b border-rule-2 px-2 py-[3px] whitespace-nowrap';
const REMARK = 'min-w-60 border-b border-rule-2 px-2 py-[3px] text-sm';

/** A profile place by place: above the phreatic line the pressure is 0 and flagged, what was not read has no figure. */
export function ProfileTable({ document, read }: { document: FlowNetDocument; read: ProfileReading }) {
  const { unitSystem, datum } = document;
  const { length, pressure } = unitNames(unitSystem);
  const level = elevationUnit(unitSystem, datum);
  const { head } = text;
  const heads = [
    head.distance(length),
    head.offset(length),
    head.elevation(level),
    head.totalHead(level),
    head.pressureHead(length),
    head.pressure(pressure),
  ];
  const headLook = 'border-b border-rule px-2 py-[5px] text-sm font-semibold whitespace-nowrap text-ink-2';
  return (
    <table className="w-full">
      <caption className="sr-only">{read.name || text.unnamed}</caption>
      <thead>
        <tr>
          {heads.map((each) => (
            <th key={each} scope="col" className={classNames(headLook, 'text-right')}>
              {each}
            </th>
          ))}
          <th scope="col" className={classNames(headLook, 'text-right')}>
            <i>{head.ru[0]}</i>
            <sub>{head.ru[1]}</sub>
          </th>
          <th scope="col" className={classNames(headLook, 'w-full text-left')}>
            {head.remark}
          </th>
        </tr>
      </thead>
      <tbody>
        {placesInOrder(read).map(({ place, sample }) => (
          <tr key={place}>
            {figuresOf(sample, unitSystem).map((figure, column) => (
              <td key={heads[column] ?? 'ru'} className={classNames(CELL, 'text-right')}>
                {figure}
              </td>
            ))}
            <td className={classNames(REMARK, lookOf(sample))}>{text.remarkOf(sample)}</td>
          </tr>
        ))}
      </tbody>
    </table>
  );
}

/** A place is known by its number along the profile: a pasted list may name one place twice. */
const placesInOrder = ({ samples }: ProfileReading) => samples.map((sample, i) => ({ place: i + 1, sample }));

function figuresOf(sample: ProfileSample, unitSystem: FlowNetDocument['unitSystem']): string[] {
  const decimals = DECIMALS[unitSystem];
  return [
    fixedText(sample.distance, 2),
    fixedText(sample.offset, 2),
    fixedText(sample.elevation, decimals.elevation),
    plusMinusText(sample.totalHead, sample.totalHeadPlusMinus, decimals.head),
    fixedText(sample.pressureHead, decimals.pressureHead),
    plusMinusText(sample.porePressure, sample.porePressurePlusMinus, decimals.pressure),
    fixedText(sample.ru, 3),
  ];
}

const lookOf = ({ status, doubtful }: ProfileSample) =>
  status === 'withheld' || doubtful !== null ? 'text-attention' : 'text-ink-2';
