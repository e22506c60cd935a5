import { fixedText, signedText } from '#client/lib/figures.ts';
import { phreaticText as text } from '#client/text/phreatic.ts';
import type { FlowNetDocument, SheetPoint } from '#shared/contract/document.ts';
import type { PhreaticEnd, PhreaticReading } from '#shared/contract/reading-phreatic.ts';
import { DECIMALS, elevationUnit, unitNames } from '#shared/text/unit-text.ts';
import { Aside, MarginSection } from './margin-section.tsx';
import { FigureCell, MarginTable, RowHead } from './margin-table.tsx';

interface PhreaticCheckProps {
  document: FlowNetDocument;
  phreatic: PhreaticReading;
  /** Brings a place of the sheet into view. */
  onShow: (at: SheetPoint) => void;
}

/** The phreatic line held against its rules: the head of each equipotential at its elevation, and both its ends. */
export function PhreaticCheck({ document, phreatic, onShow }: PhreaticCheckProps) {
  const { length } = unitNames(document.unitSystem);
  const decimals = DECIMALS[document.unitSystem];
  const level = elevationUnit(document.unitSystem, document.datum);
  return (
    <MarginSection title={text.title}>
      {phreatic.guessed ? <p className="m-0 text-attention">{text.guessed}</p> : null}
      <Aside>{text.lead}</Aside>
      {phreatic.meetings.length === 0 ? (
        <p className="m-0">{text.noMeetings}</p>
      ) : (
        <MarginTable
          caption={text.title}
          heads={[text.head(level), text.elevation(level), text.departure(length)]}
        >
          {phreatic.meetings.map(({ lineId, at, head, elevation, departure }) => (
            <tr key={`${lineId} ${at.join(' ')}`}>
              <RowHead>
                <button type="button" className="touch underline" onClick={() => onShow(at)}>
                  {fixedText(head, decimals.head)}
                  <span className="sr-only">, {text.show}</span>
                </button>
              </RowHead>
              <FigureCell>{fixedText(elevation, decimals.elevation)}</FigureCell>
              <FigureCell look="font-semibold">{signedText(departure, decimals.head)}</FigureCell>
            </tr>
          ))}
        </MarginTable>
      )}
      <ul className="m-0 list-none p-0">
        <End name={text.entry} end={phreatic.entry} onShow={onShow} />
        <End name={text.exit} end={phreatic.exit} onShow={onShow} />
      </ul>
    </MarginSection>
  );
}

function End({
  name,
  end,
  onShow,
}: {
  name: string;
  end: PhreaticEnd | null;
  onShow: PhreaticCheckProps['onShow'];
}) {
  if (end === null) return <li>{text.noEnd(name)}</li>;
  return (
    <li>
      {text.end(name, text.expected[end.expected], fixedText(end.departureDeg, 0))}{' '}
      <button type="button" className="touch text-sm underline" onClick={() => onShow(end.at)}>
        {text.show}
      </button>
    </li>
  );
}
