import { Button } from '#client/components/button.tsx';
import { Empty } from '#client/components/panel.tsx';
import { Cell, HeadCell, Table } from '#client/components/table.tsx';
import { fixedText } from '#client/lib/figures.ts';
import { carryAcrossText as text } from '#client/text/carry-across.ts';
import type { SheetPoint } from '#shared/contract/document.ts';
import type { MarkedPlace } from './matching-store.ts';

interface PlacesTableProps {
  places: readonly MarkedPlace[];
  /** By name; empty while there is no match. */
  residuals: ReadonlyMap<string, number>;
  onRemove: (name: string) => void;
}

/** The places by name, with what is left of each after the match. */
export function PlacesTable({ places, residuals, onRemove }: PlacesTableProps) {
  if (places.length === 0) return <Empty>{text.noPlaces}</Empty>;
  return (
    <Table caption={text.places} stacked>
      <thead>
        <tr>
          <HeadCell>{text.place}</HeadCell>
          <HeadCell numeric>{text.onOld}</HeadCell>
          <HeadCell numeric>{text.onNew}</HeadCell>
          <HeadCell numeric>{text.residual}</HeadCell>
          <HeadCell>
            <span className="sr-only">{text.removeShort}</span>
          </HeadCell>
        </tr>
      </thead>
      <tbody>
        {places.map(({ name, from, to }) => (
          <tr key={name}>
            <Cell>{name}</Cell>
            <Cell numeric>{placeText(from)}</Cell>
            <Cell numeric>{placeText(to)}</Cell>
            <Cell numeric>{residuals.has(name) ? fixedText(residuals.get(name)!, 1) : ''}</Cell>
            <Cell className="text-right">
              <Button look="quiet" aria-label={text.remove(name)} onClick={() => onRemove(name)}>
                {text.removeShort}
              </Button>
            </Cell>
          </tr>
        ))}
      </tbody>
    </Table>
  );
}

function placeText(place: SheetPoint | null) {
  if (place === null) return <span className="text-attention">{text.notYet}</span>;
  return `${fixedText(place[0], 1)}, ${fixedText(place[1], 1)}`;
}
