import { mkdtempSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { gzipSync } from 'node:zlib';
import type { BrowserContext } from 'playwright-core';
import { build } from 'vite';
import { projectRoot } from '#server/start/paths.mjs';
import { signInAtDam } from './api-client.ts';
import { type Bench, rowOf } from './bench.ts';
import { openBenchStand } from './bench-stand.ts';
import { openChromium, signedInContext } from './desk-in-browser.ts';

/** What any page of this make costs before it shows anything of its own. */
const BARE_PAGE = `
  import { QueryClient, QueryClientProvider } from '@tanstack/react-query';
  import { createElement } from 'react';
  import { createRoot } from 'react-dom/client';
  import { BrowserRouter, Route, Routes } from 'react-router-dom';
  import * as z from 'zod/mini';
  const title = z.parse(z.string(), 'bare');
  const route = createElement(Route, { path: '*', element: createElement('p', null, title) });
  const page = createElement(BrowserRouter, null, createElement(Routes, null, route));
  createRoot(document.body).render(createElement(QueryClientProvider, { client: new QueryClient() }, page));
`;

/** Bytes of script, gzipped, that Chromium asks for until a page rests. */
async function scriptOf(context: BrowserContext, address: string): Promise<number> {
  const page = await context.newPage();
  const scripts: Promise<Buffer>[] = [];
  page.on('response', (response) => {
    if (response.request().resourceType() === 'script') scripts.push(response.body());
  });
  await page.goto(address);
  await page.getByRole('heading', { level: 1 }).waitFor();
  // The dams list holds a stream of events open, so that the network as a whole never rests.
  await page.waitForLoadState('load');
  const bodies = await Promise.all(scripts);
  await page.close();
  if (bodies.length === 0) throw new Error('The page asked for no script.');
  return gzipped(bodies);
}

async function scriptOfBarePage(): Promise<number> {
  // Inside the project, so that the packages are found from there.
  const folder = mkdtempSync(path.join(projectRoot, 'node_modules', '.bench-'));
  try {
    writeFileSync(path.join(folder, 'bare.js'), BARE_PAGE);
    writeFileSync(path.join(folder, 'index.html'), '<script type="module" src="./bare.js"></script>');
    const outDir = path.join(folder, 'out');
    await build({ root: folder, configFile: false, logLevel: 'error', build: { outDir, target: 'es2022' } });
    const assets = path.join(outDir, 'assets');
    const scripts = readdirSync(assets).filter((name) => name.endsWith('.js'));
    return gzipped(scripts.map((name) => readFileSync(path.join(assets, name))));
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
}

const gzipped = (files: Buffer[]) =>
  files.reduce((sum, file) => sum + gzipSync(file, { level: 9 }).length, 0);

export const firstLoad: Bench = {
  name: 'first-load',
  about:
    'gzipped script of the sign-in page and of the dams list, beside a bare page with the same libraries',
  async run() {
    const stand = await openBenchStand({ pages: true });
    const browser = await openChromium();
    try {
      const client = await signInAtDam(stand);
      const signIn = await scriptOf(await browser.newContext(), `${stand.address}/sign-in`);
      const dams = await scriptOf(await signedInContext(browser, stand, client), `${stand.address}/`);
      const bare = [(await scriptOfBarePage()) / 1000];
      // Sizes do not vary from run to run: one sample is all there is.
      return [
        rowOf('first-load', 'kB', [signIn / 1000], bare),
        rowOf('first-load-dams', 'kB', [dams / 1000], bare),
      ];
    } finally {
      await browser.close();
      await stand.close();
    }
  },
};
