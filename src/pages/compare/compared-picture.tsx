import { useState } from 'react';
import { SelectField } from '#client/components/field.tsx';
import { Panel } from '#client/components/panel.tsx';
import { compareText as text } from '#client/text/compare.ts';
import type { ComparedNet } from './compared-net.ts';
import { SheetsBeside } from './sheets-beside.tsx';
import { SheetsOver } from './sheets-over.tsx';

type Way = keyof typeof text.ways;

interface ComparedPictureProps {
  one: ComparedNet;
  other: ComparedNet;
}

/** Both nets in sight: over each other where they lie on the same sheet, else side by side. */
export function ComparedPicture({ one, other }: ComparedPictureProps) {
  const onOneSheet = one.sheet.id === other.sheet.id;
  const [chosen, setChosen] = useState<Way | null>(null);
  // Two sections of a sheet lie apart on it: over each other nothing of them meets.
  const usual: Way = onOneSheet && one.section.id === other.section.id ? 'over' : 'beside';
  const way = onOneSheet ? (chosen ?? usual) : 'beside';
  return (
    <Panel
      title={text.picture}
      look="register"
      action={
        onOneSheet ? (
          <SelectField
            label={text.way}
            labelHidden
            value={way}
            onChange={({ target }) => setChosen(target.value as Way)}
          >
            {(Object.keys(text.ways) as Way[]).map((each) => (
              <option key={each} value={each}>
                {text.ways[each]}
              </option>
            ))}
          </SelectField>
        ) : null
      }
    >
      {way === 'over' ? <SheetsOver one={one} other={other} /> : <SheetsBeside one={one} other={other} />}
    </Panel>
  );
}
