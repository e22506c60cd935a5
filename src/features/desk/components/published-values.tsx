import { plainText } from '#client/lib/figures.ts';
import { exitsText } from '#client/text/exits.ts';
import {
  PUBLISHED_VALUES,
  type PublishedValue,
  publishedValues,
} from '#shared/compute/quantities/published-values.ts';

const text = exitsText.published;
const ABOUT = [...new Set(PUBLISHED_VALUES.map(({ about }) => about))];

/** Values that books and manuals give, as information with their sources. */
export function PublishedValues() {
  return (
    <details>
      <summary className="touch cursor-pointer font-semibold">{text.title}</summary>
      <p className="m-0 text-sm text-ink-2">{text.lead}</p>
      <div className="grid gap-x-6 gap-y-2 py-1 text-sm sm:grid-cols-2">
        {ABOUT.map((about) => (
          <section key={about}>
            <h4 className="m-0 text-sm font-semibold">{text.about[about]}</h4>
            <ul className="m-0 list-none p-0">
              {publishedValues(about).map((value) => (
                <li key={`${value.name} ${value.source}`}>{sentenceOf(value)}</li>
              ))}
            </ul>
          </section>
        ))}
      </div>
    </details>
  );
}

function sentenceOf({ name, from, to, source, provenance }: PublishedValue): string {
  const range = from === to ? plainText(from) : `${plainText(from)} to ${plainText(to)}`;
  const told = provenance === 'fromMemory' ? `${source}, ${text.fromMemory}` : source;
  return `${name}: ${range} (${told})`;
}
