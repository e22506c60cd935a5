import type { Page } from 'playwright-core';

/** What makes a narrow page scroll sideways; boxes that scroll by themselves, as tables of figures do, are none of it. */
export async function faultsAt320(page: Page, state: string): Promise<string[]> {
  const before = page.viewportSize();
  // 1280 CSS pixels at 400 %, by which WCAG 2.2 (1.4.10) measures.
  await page.setViewportSize({ width: 320, height: 640 });
  await settled(page);
  const found = await page.evaluate(() => {
    const { scrollWidth, clientWidth } = document.documentElement;
    if (scrollWidth <= clientWidth) return [];
    const wide = [...document.querySelectorAll('body *')].filter((each) => {
      const { right, width } = each.getBoundingClientRect();
      for (let at = each.parentElement; at !== null && at !== document.body; at = at.parentElement) {
        // Scrolls by itself, or is cut: then it widens nothing.
        if (getComputedStyle(at).overflowX !== 'visible') return false;
      }
      return width > 0 && right > clientWidth + 1;
    });
    return wide.slice(0, 3).map((each) => `${scrollWidth} px wide: ${each.outerHTML.slice(0, 120)}`);
  });
  if (before) await page.setViewportSize(before);
  await settled(page);
  return found.map((each) => `${state} at 320 px: ${each}`);
}

/** What is cut off or lies under something else once letters are twice as large (WCAG 2.2, 1.4.4). */
export async function faultsAtTwiceTheText(page: Page, state: string): Promise<string[]> {
  await page.evaluate(() => {
    document.documentElement.style.fontSize = '200%';
  });
  await settled(page);
  const found = await hiddenWords(page);
  await page.evaluate(() => {
    document.documentElement.style.fontSize = '';
  });
  await settled(page);
  return found.map((each) => `${state} at 200 % text: ${each}`);
}

/** What is cut off, covered, or pushed out at the side, in a browser that has been set to larger letters. */
export async function faultsOfLargerLetters(page: Page, state: string): Promise<string[]> {
  const found = await hiddenWords(page);
  const aside = await page.evaluate(() => {
    const tools = document.querySelector('nav[aria-label="Drawing tools"].flex-col');
    return [document.documentElement, tools].flatMap((each) =>
      each && each.scrollWidth > each.clientWidth
        ? `${each.scrollWidth} px in ${each.clientWidth}: ${each.outerHTML.slice(0, 80)}`
        : [],
    );
  });
  return [...found, ...aside].map((each) => `${state}: ${each}`);
}

const settled = (page: Page) =>
  page.evaluate(
    () => new Promise<void>((done) => requestAnimationFrame(() => requestAnimationFrame(() => done()))),
  );

/**
 * Words that nobody can read where they stand: cut off by a box that does not scroll, or under another element. What a
 * scrolling box has scrolled away, and what is only told to screen readers, is left out.
 */
export function hiddenWords(page: Page): Promise<string[]> {
  return page.evaluate(() => {
    const clips = (value: string) => value === 'hidden' || value === 'clip';
    const scrolls = (value: string) => value === 'auto' || value === 'scroll';
    /** The part of a box that its ancestors leave of it, and the ancestor that cuts without scrolling. */
    function leftOf(element: Element, rect: DOMRect) {
      let { left, top, right, bottom } = rect;
      let cutBy: Element | null = null;
      for (
        let at: Element | null = element;
        at !== null && at !== document.documentElement;
        at = at.parentElement
      ) {
        const { overflowX, overflowY, position } = getComputedStyle(at);
        const box = at.getBoundingClientRect();
        const isCut = rect.right > box.right + 2 || rect.left < box.left - 2;
        const isCutDown = rect.bottom > box.bottom + 2 || rect.top < box.top - 2;
        if ((clips(overflowX) && isCut) || (clips(overflowY) && isCutDown)) cutBy ??= at;
        if (clips(overflowX) || scrolls(overflowX))
          [left, right] = [Math.max(left, box.left), Math.min(right, box.right)];
        if (clips(overflowY) || scrolls(overflowY))
          [top, bottom] = [Math.max(top, box.top), Math.min(bottom, box.bottom)];
        if ((scrolls(overflowX) && isCut) || (scrolls(overflowY) && isCutDown)) return null;
        if (position === 'fixed') break;
      }
      return { left, top, right, bottom, cutBy };
    }
    const faults: string[] = [];
    const words = document.createTreeWalker(document.body, NodeFilter.SHOW_TEXT);
    for (let node = words.nextNode(); node !== null; node = words.nextNode()) {
      const element = node.parentElement;
      const said = node.textContent?.trim() ?? '';
      if (
        element === null ||
        said === '' ||
        !element.checkVisibility({ visibilityProperty: true, opacityProperty: true })
      )
        continue;
      if (element.closest('.sr-only, script, style, option, svg, [data-live-help]')) continue;
      // What lets presses through is not met by asking what lies at a place.
      if (getComputedStyle(element).pointerEvents === 'none') continue;
      const dialog = [...document.querySelectorAll('dialog[open]')].at(-1);
      if (dialog && !dialog.contains(element)) continue;
      const range = document.createRange();
      range.selectNodeContents(node);
      for (const rect of range.getClientRects()) {
        if (rect.width < 2 || rect.height < 2) continue;
        const left = leftOf(element, rect);
        if (left === null) continue;
        if (left.cutBy !== null) {
          faults.push(`"${said.slice(0, 40)}" is cut off by ${left.cutBy.outerHTML.slice(0, 90)}`);
          break;
        }
        const [x, y] = [(left.left + left.right) / 2, (left.top + left.bottom) / 2];
        if (x < 0 || y < 0 || x >= innerWidth || y >= innerHeight) continue;
        const over = document.elementFromPoint(x, y);
        const isOwn =
          over === null ||
          !over.checkVisibility({ opacityProperty: true }) ||
          over.contains(element) ||
          element.contains(over) ||
          over.closest('label')?.contains(element);
        if (!isOwn) {
          faults.push(`"${said.slice(0, 40)}" lies under ${over.outerHTML.slice(0, 90)}`);
          break;
        }
      }
    }
    return faults;
  });
}

/** What takes the focus without showing it, or while it lies under something else (WCAG 2.2, 2.4.7 and 2.4.11). */
export async function focusFaults(page: Page, state: string): Promise<string[]> {
  // The browser shows the focus to those who work by keys.
  await page.keyboard.press('Tab');
  const found = await page.evaluate(async () => {
    const faults: string[] = [];
    const root = [...document.querySelectorAll('dialog[open]')].at(-1) ?? document.body;
    const takers = root.querySelectorAll<HTMLElement>(
      'a[href]:not([tabindex="-1"]), button:not(:disabled), input:not(:disabled), select:not(:disabled), textarea:not(:disabled), [tabindex="0"]',
    );
    for (const each of takers) {
      if (!each.isConnected || !each.checkVisibility({ visibilityProperty: true })) continue;
      each.focus();
      if (document.activeElement !== each) continue;
      const name = each.outerHTML.slice(0, 110);
      const shown = (at: Element | null) =>
        at !== null &&
        getComputedStyle(at).outlineStyle !== 'none' &&
        Number.parseFloat(getComputedStyle(at).outlineWidth) >= 1.5;
      // A ring of its own, as large as what has the focus, counts when it is there with the focus.
      const ring = each.querySelector(':scope > [data-focus-ring]');
      const ringShown =
        ring?.checkVisibility() === true &&
        ring.getBoundingClientRect().width === each.getBoundingClientRect().width &&
        shown(ring);
      if (!shown(each) && !shown(each.closest('label')) && !ringShown)
        faults.push(`no focus is seen on ${name}`);
      const { left, top, width, height } = each.getBoundingClientRect();
      if (width < 2 || height < 2) continue;
      const spots = [0.1, 0.5, 0.9].flatMap((a) =>
        [0.1, 0.5, 0.9].map((b) => [left + a * width, top + b * height] as const),
      );
      const within = spots.filter(([x, y]) => x >= 0 && y >= 0 && x < innerWidth && y < innerHeight);
      const seen = within.some(([x, y]) => {
        const over = document.elementFromPoint(x, y);
        return (
          over === each ||
          each.contains(over) ||
          over?.contains(each) === true ||
          over?.closest('label')?.contains(each) === true
        );
      });
      if (!seen) faults.push(`the focus is out of sight on ${name}`);
    }
    return faults;
  });
  return found.map((each) => `${state}: ${each}`);
}
