import { useEffect, useMemo, useRef, useState } from 'react';
import { useStore } from 'zustand';
import { Button } from '#client/components/button.tsx';
import { Actions, Dialog } from '#client/components/dialog.tsx';
import { NumberField, SelectField } from '#client/components/field.tsx';
import { ProgressBar } from '#client/components/progress-bar.tsx';
import { downloadBlob } from '#client/lib/download.ts';
import { fixedText, plainText } from '#client/lib/figures.ts';
import { parseTypedNumber } from '#client/lib/parse-number.ts';
import { commonText } from '#client/text/common.ts';
import { pictureText as text } from '#client/text/picture.ts';
import type { DeskStore } from '../model/desk-state.ts';
import { type Measure, PAPERS, type Paper } from '../model/picture-page.ts';
import type { SheetRaster } from '../model/sheet-raster.ts';
import type { ViewStore } from '../model/view-store.ts';
import type { SheetFrame } from '../model/viewport.ts';
import type { NoteBalloon } from '../render/build-scene.ts';
import { paintPicture, pictureSize } from '../render/picture-painter.ts';
import { createMeasure } from '../render/picture-words.ts';
import { type PictureFacts, type PicturePlan, planPicture, scaleFigure } from './picture-plan.ts';
import { PrintedPicture } from './printed-picture.tsx';

const DPIS = [96, 150, 300] as const;
const BY_WIDTH = 'width';
const LEAST_WIDTH_PX = 600;
/** Wider ones are more than other programs open readily, and finer than any printer. */
const MOST_WIDTH_PX = 12_000;
const MM_PER_INCH = 25.4;

export type PictureOf = {
  store: DeskStore;
  views: ViewStore;
  raster: SheetRaster;
  frame: SheetFrame | null;
  notes: readonly NoteBalloon[];
  facts: () => PictureFacts;
};

type Typed = {
  part: 'section' | 'view';
  paper: Paper;
  resolution: string;
  width: string;
  scale: string;
};
const FIRST: Typed = { part: 'section', paper: 'A4', resolution: '150', width: '2000', scale: '' };

/** Makes a picture of the sheet with its title block, legend and scale bar, to be kept as a file or printed. */
export default function PictureDialog({ of, onClose }: { of: PictureOf; onClose: () => void }) {
  const [typed, setTyped] = useState(FIRST);
  const measure = useMeasure();
  const dpi = dpiOf(typed);
  const plan = usePlan(of, typed, dpi ?? DPIS[0], measure);
  const painting = usePainting(plan);
  const [printed, setPrinted] = useState<Blob | null>(null);
  const set = (change: Partial<Typed>) => setTyped({ ...typed, ...change });
  const ready = plan !== null && dpi !== null && !painting.busy;

  return (
    <Dialog title={text.title} onClose={onClose}>
      <div className="flex flex-col gap-3">
        <SelectField
          label={text.part}
          value={typed.part}
          onChange={(event) => set({ part: event.target.value as Typed['part'] })}
        >
          <option value="section">{text.parts.section}</option>
          <option value="view">{text.parts.view}</option>
        </SelectField>
        <div className="grid grid-cols-2 items-start gap-3">
          <SelectField
            label={text.paper}
            value={typed.paper}
            onChange={(event) => set({ paper: event.target.value as Paper, scale: '' })}
          >
            {Object.keys(PAPERS).map((paper) => (
              <option key={paper}>{paper}</option>
            ))}
          </SelectField>
          <ScaleField plan={plan} value={typed.scale} onChange={(scale) => set({ scale })} />
          <SelectField
            label={text.resolution}
            value={typed.resolution}
            onChange={(event) => set({ resolution: event.target.value })}
          >
            {DPIS.map((each) => (
              <option key={each} value={each}>
                {text.dpi(each)}
              </option>
            ))}
            <option value={BY_WIDTH}>{text.byWidth}</option>
          </SelectField>
          {typed.resolution === BY_WIDTH ? (
            <NumberField
              label={text.widthField}
              value={typed.width}
              error={dpi === null ? text.widthWrong(LEAST_WIDTH_PX, MOST_WIDTH_PX) : null}
              onChange={(event) => set({ width: event.target.value })}
            />
          ) : null}
        </div>
        <PlanLine plan={plan} dpi={dpi} measured={measure !== null} />
        <p className="m-0 text-sm text-ink-2">{text.printHint}</p>
        {painting.busy ? <ProgressBar label={text.making} value={painting.share} /> : null}
        {painting.failed ? (
          <p role="alert" className="m-0 text-wrong">
            {text.failed}
          </p>
        ) : null}
      </div>
      <Actions>
        <Button
          look="main"
          disabled={!ready}
          onClick={() => void painting.paint((png) => downloadBlob(png, of.facts().fileName))}
        >
          {text.save}
        </Button>
        <Button disabled={!ready} onClick={() => void painting.paint(setPrinted)}>
          {text.print}
        </Button>
        <Button look="quiet" onClick={onClose}>
          {painting.busy ? commonText.cancel : commonText.close}
        </Button>
      </Actions>
      {printed && plan ? (
        <PrintedPicture
          png={printed}
          paper={typed.paper}
          page={plan.job.page}
          label={text.printed}
          onDone={() => setPrinted(null)}
        />
      ) : null}
    </Dialog>
  );
}

type ScaleFieldProps = { plan: PicturePlan | null; value: string; onChange(scale: string): void };

function ScaleField({ plan, value, onChange }: ScaleFieldProps) {
  const fits = plan?.fits ?? null;
  return (
    <SelectField label={text.scale} value={value} onChange={(event) => onChange(event.target.value)}>
      <option value="">{text.fits(fits === null ? null : plainText(fits, 3))}</option>
      {plan?.scales.map((n) => (
        <option key={n} value={n}>
          {text.scaleOf(scaleFigure(n))}
        </option>
      ))}
    </SelectField>
  );
}

function PlanLine({
  plan,
  dpi,
  measured,
}: {
  plan: PicturePlan | null;
  dpi: number | null;
  measured: boolean;
}) {
  if (!measured || dpi === null) return null;
  if (plan === null) return <p className="m-0 text-attention">{text.tooTall}</p>;
  const { widthPx, heightPx } = pictureSize(plan.job);
  return (
    <>
      <p role="status" className="m-0 tabular-nums">
        {text.sizeOf(widthPx, heightPx, fixedText(dpi, 0))}
      </p>
      {plan.fits === null ? <p className="m-0 text-attention">{text.noScale}</p> : null}
    </>
  );
}

/** Dots per inch asked for; null while the width typed is none that can be taken. */
function dpiOf({ resolution, width, paper }: Typed): number | null {
  if (resolution !== BY_WIDTH) return Number(resolution);
  const px = parseTypedNumber(width);
  if (px === null || !Number.isInteger(px) || px < LEAST_WIDTH_PX || px > MOST_WIDTH_PX) return null;
  return (px * MM_PER_INCH) / PAPERS[paper][0];
}

function useMeasure(): Measure | null {
  const [measure, setMeasure] = useState<Measure | null>(null);
  useEffect(() => {
    let wanted = true;
    void createMeasure(document).then((made) => wanted && setMeasure(() => made));
    return () => {
      wanted = false;
    };
  }, []);
  return measure;
}

/** The page as it would be made now; follows the net while the dialog is open. */
function usePlan(of: PictureOf, typed: Typed, dpi: number, measure: Measure | null): PicturePlan | null {
  const net = useStore(of.store, (state) => state.document);
  const reading = useStore(of.store, (state) => state.reading);
  const { part, paper, scale } = typed;
  return useMemo(() => {
    if (measure === null) return null;
    const subject = {
      state: { ...of.store.getState(), document: net, reading },
      notes: of.notes,
      raster: of.raster,
      frame: of.frame,
      view: of.views.getState().view,
      facts: of.facts(),
    };
    return planPicture(subject, { part, paper, dpi, scale: scale === '' ? null : Number(scale) }, measure);
  }, [of, net, reading, part, paper, scale, dpi, measure]);
}

/** The work under way: one at a time, ended when the dialog goes. */
function usePainting(plan: PicturePlan | null) {
  const [share, setShare] = useState<number | null>(null);
  const [failed, setFailed] = useState(false);
  const work = useRef<AbortController | null>(null);
  useEffect(() => () => work.current?.abort(), []);

  async function paint(then: (png: Blob) => void): Promise<void> {
    if (plan === null) return;
    const own = new AbortController();
    work.current = own;
    setFailed(false);
    setShare(0);
    try {
      then(await paintPicture(plan.job, own.signal, setShare));
    } catch (error) {
      if (own.signal.aborted) return;
      console.error(error);
      setFailed(true);
    } finally {
      if (!own.signal.aborted) setShare(null);
    }
  }
  return { busy: share !== null, share, failed, paint };
}
