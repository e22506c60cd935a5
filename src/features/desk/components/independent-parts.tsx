import { useStore } from 'zustand';
import { Button } from '#client/components/button.tsx';
import { CheckField } from '#client/components/field.tsx';
import { fixedText, sentenceText, signedText } from '#client/lib/figures.ts';
import { independentText as text } from '#client/text/independent.ts';
import type { DifferencePicture } from '#shared/compute/beside/difference-picture.ts';
import { STEPS } from '#shared/compute/beside/difference-steps.ts';
import type { FlowNetDocument, SheetPoint } from '#shared/contract/document.ts';
import { unitNames } from '#shared/text/unit-text.ts';
import type { DeskChecks, IndependentResult, IndependentState } from '../model/desk-checks.ts';
import { Aside, MarginSection } from './margin-section.tsx';

/** Asks for the solution, follows it and says why there is none. */
export function SolveControl({
  state,
  again,
  checks,
  onPlace,
}: {
  state: IndependentState;
  again: boolean;
  checks: DeskChecks;
  onPlace: (at: SheetPoint) => void;
}) {
  const working = state.state === 'working';
  return (
    <div className="flex flex-col gap-2">
      <div className="flex items-center gap-3">
        {working ? (
          <Button look="quiet" onClick={() => checks.cancel()}>
            {text.cancel}
          </Button>
        ) : (
          <Button look={again ? 'quiet' : 'plain'} onClick={() => checks.solve()}>
            {again ? text.again : text.solve}
          </Button>
        )}
        <span role="status">{working ? text.stages[state.stage] : ''}</span>
      </div>
      {state.state === 'failed' ? (
        <div role="alert" className="bg-doubt p-2">
          <p className="m-0 text-wrong">
            <b className="font-semibold">{text.failed}</b> {sentenceText(state.text)}
          </p>
          <PlaceButton at={state.at} onPlace={onPlace} />
        </div>
      ) : null}
    </div>
  );
}

function PlaceButton({ at, onPlace }: { at: SheetPoint | null; onPlace: (at: SheetPoint) => void }) {
  if (at === null) return null;
  return (
    <button type="button" className="touch text-sm underline" onClick={() => onPlace(at)}>
      {text.showPlace}
    </button>
  );
}

/** How the tints are to be read, and the greatest differences; or that there are none to draw. */
function differencesHint(picture: DifferencePicture, unit: string): string {
  const steps = STEPS.map((part) => text.percent(part, 1));
  const { compared, greatestAbove, greatestBelow } = picture;
  if (compared === 0) return text.noDifferences;
  const parts = [greatestAbove, greatestBelow].map((found) => Math.abs(found?.part ?? 0));
  if (Math.max(...parts) < STEPS[0]) return text.nowhere(text.percent(STEPS[0], 1));
  const [above, below] = [greatestAbove, greatestBelow].map(
    (found) => `${signedText(found?.head ?? 0, 2)} ${unit}`,
  );
  return `${text.differencesHint(steps)} ${text.greatest(above ?? '', below ?? '')}`;
}

/** What of the solution is laid over the sheet. */
export function SolutionSwitches({
  beside,
  checks,
  unit,
}: {
  beside: IndependentResult['beside'];
  checks: DeskChecks;
  unit: string;
}) {
  const { netShown, differencesShown } = useStore(checks);
  const { picture } = beside;
  return (
    <MarginSection title={text.show}>
      <CheckField
        label={text.showNet}
        hint={text.showNetHint}
        checked={netShown}
        onChange={(event) => checks.showNet(event.target.checked)}
      />
      <CheckField
        label={text.showDifferences}
        hint={differencesHint(beside.picture, unit)}
        disabled={picture.compared === 0}
        checked={differencesShown && picture.compared > 0}
        onChange={(event) => checks.showDifferences(event.target.checked)}
      />
    </MarginSection>
  );
}

/** What the solution was made of and how exact it is. */
export function SolutionQuality({
  beside,
  document,
}: {
  beside: IndependentResult['beside'];
  document: FlowNetDocument;
}) {
  const { net, imbalance, gap, surfaceMisfit, nodeCount, usesPhreaticLine } = beside;
  const { length } = unitNames(document.unitSystem);
  const channels = net.channels === null ? null : fixedText(net.channels, 2);
  return (
    <MarginSection title={text.net}>
      <p className="m-0">{text.netCounts(net.drops, channels)}</p>
      {usesPhreaticLine ? <p className="m-0 text-attention">{text.usesPhreatic}</p> : null}
      <Aside>
        {text.quality(text.within(imbalance), String(nodeCount))}{' '}
        {gap === null ? '' : text.gap(text.within(gap))}{' '}
        {surfaceMisfit === null ? '' : text.surface(`${fixedText(surfaceMisfit, 3)} ${length}`)}
      </Aside>
    </MarginSection>
  );
}
