import { useSyncExternalStore } from 'react';

/** Letters of a browser that nobody has set. */
const USUAL_LETTERS_PX = 16;

/** How many times larger than usual the letters are that are set in the browser; followed while the component is shown. */
export function useLetterScale(): number {
  return useSyncExternalStore(onLetterSize, letterScale);
}

function letterScale(): number {
  return Number.parseFloat(getComputedStyle(document.documentElement).fontSize) / USUAL_LETTERS_PX;
}

/** No event tells of the letters' size, but an element that is measured by them changes its own. */
function onLetterSize(changed: () => void): () => void {
  const measure = document.createElement('div');
  Object.assign(measure.style, { position: 'absolute', width: '1rem', visibility: 'hidden' });
  document.body.append(measure);
  const observer = new ResizeObserver(changed);
  observer.observe(measure);
  return () => {
    observer.disconnect();
    measure.remove();
  };
}
