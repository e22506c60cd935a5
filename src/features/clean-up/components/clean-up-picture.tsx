import { type PointerEvent, useDeferredValue, useMemo } from 'react';
import { cleanUpText as text } from '#client/text/clean-up.ts';
import type { PictureSize } from '#shared/compute/renditions/rendition-geometry.ts';
import { AS_SCANNED, type RenditionSettings } from '#shared/contract/renditions.ts';
import type { Place, Setting } from '../model/handles.ts';
import { previewOf, type SmallSheet } from '../model/preview.ts';
import { HandleLayer } from './handle-layer.tsx';
import { PixelCanvas } from './pixel-canvas.tsx';

/** With the panel's head above it the whole picture fits in the window, so that each handle is in reach. */
const TALLEST = 'max(16rem, 100vh - 10rem)';

type CleanUpPictureProps = {
  small: SmallSheet;
  pageNumber: number;
  /** What is shown: without what is just being set by handles. */
  settings: RenditionSettings;
  asScanned: boolean;
  handles: { setting: Setting; places: readonly Place[]; size: PictureSize } | null;
  onHandles: (places: readonly Place[], moved: number) => void;
  /** A place of the picture was pressed. */
  onLookAt: (at: Place) => void;
};

/** The sheet as the settings make it, drawn anew with each change, with the handles over it. */
export function CleanUpPicture(props: CleanUpPictureProps) {
  const { small, pageNumber, asScanned, handles, onHandles, onLookAt } = props;
  const settings = useDeferredValue(asScanned ? AS_SCANNED : props.settings);
  const preview = useMemo(() => previewOf(small, settings), [small, settings]);
  if (preview === null) return <p className="m-0 px-3.5 py-4 text-wrong">{text.noPicture}</p>;
  const { widthPx, heightPx } = preview.full;
  const press = (event: PointerEvent<HTMLDivElement>) => {
    if (handles !== null || asScanned) return;
    const box = event.currentTarget.getBoundingClientRect();
    onLookAt([
      ((event.clientX - box.left) / box.width) * widthPx,
      ((event.clientY - box.top) / box.height) * heightPx,
    ]);
  };
  return (
    <div
      className="relative mx-auto w-full bg-sheet"
      style={{
        aspectRatio: `${widthPx} / ${heightPx}`,
        maxWidth: `calc(${TALLEST} * ${widthPx / heightPx})`,
      }}
      onPointerDown={press}
    >
      <PixelCanvas
        rows={preview.rows}
        label={asScanned ? text.pictureOfScan(pageNumber) : text.picture(pageNumber)}
        className="absolute inset-0 size-full"
      />
      {handles === null || asScanned ? null : (
        <HandleLayer
          setting={handles.setting}
          handles={handles.places}
          size={handles.size}
          onHandles={onHandles}
        />
      )}
    </div>
  );
}
