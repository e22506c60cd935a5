import { SelectField } from '#client/components/field.tsx';
import { fixedText, plainText } from '#client/lib/figures.ts';
import { carryAcrossText as text } from '#client/text/carry-across.ts';
import {
  FEWEST_PLACES,
  type MatchShape,
  scaleOf,
  turnOf,
} from '#shared/compute/carry-across/match-sheets.ts';
import type { Matching } from './matching.ts';

interface MatchFactsProps {
  matching: Matching;
  shape: MatchShape;
  onShape: (shape: MatchShape) => void;
}

/** How the new sheet lies on the old one, and how well that is known. */
export function MatchFacts({ matching, shape, onShape }: MatchFactsProps) {
  return (
    <div className="flex flex-col gap-3 px-3.5 py-3">
      <SelectField
        label={text.shape}
        value={shape}
        onChange={(event) => onShape(event.target.value as MatchShape)}
      >
        {Object.entries(text.shapes).map(([value, label]) => (
          <option key={value} value={value}>
            {label}
          </option>
        ))}
      </SelectField>
      <p className="m-0" role="status">
        {factsOf(matching, shape)}
      </p>
    </div>
  );
}

function factsOf({ pairs, match, residuals, sigmaPx }: Matching, shape: MatchShape): string {
  const missing = FEWEST_PLACES[shape] - pairs.length;
  if (missing > 0) return text.needs(missing);
  if (match === null) return text.noMatch;
  const facts = text.facts(plainText(scaleOf(match), 4), fixedText((turnOf(match) * 180) / Math.PI, 2));
  if (sigmaPx === null) return `${facts} ${text.noneLeftOver}`;
  const [name, worst] = [...residuals].reduce((most, each) => (each[1] > most[1] ? each : most));
  return `${facts} ${text.agreement(fixedText(sigmaPx, 1), fixedText(worst, 1), name)}`;
}
