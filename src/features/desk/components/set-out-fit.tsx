import { useMemo } from 'react';
import { fixedText, plainText, signedText } from '#client/lib/figures.ts';
import { setOutText as text } from '#client/text/desk-forms.ts';
import { placingText as placing } from '#client/text/set-out.ts';
import { readSetOut } from '#shared/compute/set-out.ts';
import { suspectAmong } from '#shared/compute/set-out-suspect.ts';
import { type FlowNetDocument, singleOf } from '#shared/contract/document.ts';
import type { SetOutReading } from '#shared/contract/reading.ts';
import { unitNames } from '#shared/text/unit-text.ts';

/** What the known points come to: scale, turn, how well they agree, and what they leave to any place. */
export function SetOutFit({ document, setOut }: { document: FlowNetDocument; setOut: SetOutReading }) {
  const unit = unitNames(document.unitSystem).length;
  const stated = singleOf(document, 'setOut')?.value.statedScale ?? null;
  return (
    <section className="border-t border-rule pt-2">
      <h3 className="m-0 text-sm font-semibold">{text.result}</h3>
      <Scale setOut={setOut} unit={unit} />
      {stated !== null && setOut.impliedScale === null ? (
        <p className="m-0 text-attention">{text.noResolution}</p>
      ) : null}
      <p className="m-0">{text.rotation(signedText(setOut.rotationDeg, 2))}.</p>
      <p className="m-0">
        {setOut.residual === null
          ? text.residualNone
          : `${text.residualAll(`${fixedText(setOut.residual, 3)} ${unit}`)}.`}
      </p>
      <Agreement document={document} />
      <PlaceDoubt setOut={setOut} unit={unit} />
    </section>
  );
}

function Scale({ setOut, unit }: { setOut: SetOutReading; unit: string }) {
  const implied = setOut.impliedScale === null ? '' : `, ${text.implied(plainText(setOut.impliedScale, 3))}`;
  const perPx = (value: number | null) => `${plainText(value, 4)} ${unit}/px`;
  const times = setOut.exaggeration ?? 1;
  const words =
    Math.abs(times - 1) < 1e-9
      ? text.scale(perPx(setOut.unitsPerPx))
      : placing.twoScales(perPx(setOut.unitsPerPx), perPx(setOut.unitsPerPxUp), plainText(times, 3));
  return (
    <p className="m-0">
      {words}
      {implied}.
    </p>
  );
}

/** Whether one point alone spoils the fit, or how much more would be needed to tell. */
function Agreement({ document }: { document: FlowNetDocument }) {
  const { fit, grounds, test } = useMemo(() => tested(document), [document]);
  if (fit === null) return null;
  return (
    <>
      {test?.state === 'none' && <p className="m-0 text-ink-2">{placing.noneSuspect}</p>}
      {test?.state === 'tooFew' && <p className="m-0 text-ink-2">{placing.tooFewToSuspect(test.more)}</p>}
      {grounds?.turnFromSheet && <p className="m-0 text-attention">{placing.turnFromSheet}</p>}
    </>
  );
}

function tested(document: FlowNetDocument) {
  const { fit, grounds } = readSetOut(document);
  const held = singleOf(document, 'setOut')?.value;
  if (fit === null || grounds === null || held?.method !== 'points') return { fit, grounds, test: null };
  const model = { fit, scales: held.scales, turnFromSheet: grounds.turnFromSheet };
  return { fit, grounds, test: suspectAmong(document, model) };
}

function PlaceDoubt({ setOut, unit }: { setOut: SetOutReading; unit: string }) {
  const { placeDoubt } = setOut;
  if (placeDoubt === null) return null;
  const rows = [
    [placing.doubtMiddle, placeDoubt.middle],
    [placing.doubtCorner, placeDoubt.corner],
  ] as const;
  return (
    <>
      <h4 className="m-0 mt-1.5 text-sm font-semibold">{placing.doubtTitle}</h4>
      {rows.map(([where, { offset, elevation }]) => (
        <p key={where} className="m-0 tabular-nums first-letter:uppercase">
          {placing.doubtOf(where, plainText(offset, 2), plainText(elevation, 2), unit)}
        </p>
      ))}
      <p className="m-0 text-sm text-ink-2">{placing.doubtWhy}</p>
    </>
  );
}
