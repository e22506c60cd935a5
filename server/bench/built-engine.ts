import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { pathToFileURL } from 'node:url';
import { build } from 'vite';
import { projectRoot } from '#server/start/paths.mjs';

export type Engine = typeof import('./engine-entry.ts');

/**
 * The engine built by the bundler and for the target of the pages, as the desk's worker runs it. The loader by which
 * this bench itself runs names every inner function anew at each call, which costs a third more in the hot loops.
 */
export async function builtEngine(): Promise<Engine> {
  const outDir = mkdtempSync(path.join(tmpdir(), 'tracehead-engine-'));
  try {
    await build({
      root: projectRoot,
      configFile: false,
      logLevel: 'error',
      build: {
        outDir,
        target: 'es2022',
        ssr: path.join(import.meta.dirname, 'engine-entry.ts'),
        minify: true,
        rollupOptions: { output: { entryFileNames: 'engine.mjs' } },
      },
      ssr: { noExternal: true, target: 'webworker' },
    });
    return await import(pathToFileURL(path.join(outDir, 'engine.mjs')).href);
  } finally {
    rmSync(outDir, { recursive: true, force: true });
  }
}
