import { fixedText } from '#client/lib/figures.ts';
import { explanationText as text } from '#client/text/explanation.ts';
import type { NetReading } from '#shared/contract/reading.ts';
import { DoubtSharesList } from './doubt-shares.tsx';
import type { MarginForm } from './margin-form.tsx';
import { MarginSection } from './margin-section.tsx';

/** The factor within which the seepage is known, and what it comes from; nothing while there is no seepage. */
export function SeepageDoubt({
  reading,
  onOpen,
}: {
  reading: NetReading | null;
  onOpen: ((form: MarginForm) => void) | null;
}) {
  if (!reading || reading.quantities.seepage === null) return null;
  const { seepageFactor, seepageShares } = reading.doubt;
  return (
    <MarginSection title={`${text.seepage}, ${text.doubt}`}>
      {seepageFactor === null ? (
        <p className="m-0 text-attention">{text.noFactor}</p>
      ) : (
        <>
          <p className="m-0 font-semibold">{text.factor(fixedText(seepageFactor, 1))}</p>
          <DoubtSharesList
            shares={seepageShares}
            what={text.seepage.toLowerCase()}
            pointId={null}
            onOpen={onOpen}
          />
        </>
      )}
    </MarginSection>
  );
}
