import path from 'node:path';
import { build, type Rolldown } from 'vite';
import { beforeAll, describe, expect, it } from 'vitest';
import { projectRoot } from '#server/start/paths.mjs';

type Chunk = Rolldown.OutputChunk;

const chunks = new Map<string, Chunk>();

beforeAll(async () => {
  const built = await build({ root: projectRoot, logLevel: 'error', build: { write: false } });
  for (const { output } of [built].flat() as Rolldown.RolldownOutput[]) {
    for (const file of output) if (file.type === 'chunk') chunks.set(file.fileName, file);
  }
}, 180_000);

/** Sources, from the project's folder, of all scripts that a page needs before it shows anything. */
function sourcesOf(page: string): string[] {
  const wanted = path.join(projectRoot, page);
  const own = [...chunks.values()].find(({ facadeModuleId }) => facadeModuleId === wanted);
  const entry = [...chunks.values()].find(({ isEntry }) => isEntry);
  if (own === undefined || entry === undefined) throw new Error(`${page} has no script of its own.`);
  const needed = new Set<Chunk>();
  const need = (chunk: Chunk) => {
    if (needed.has(chunk)) return;
    needed.add(chunk);
    for (const imported of chunk.imports) need(chunks.get(imported)!);
  };
  need(entry);
  need(own);
  return [...needed].flatMap(({ moduleIds }) => moduleIds.map((id) => path.relative(projectRoot, id)));
}

describe('what a page fetches before it shows anything', () => {
  it.each([
    ['the sign-in page', 'src/pages/sign-in/sign-in-page.tsx'],
    ['the dams list', 'src/pages/dams/dams-page.tsx'],
  ])('%s: nothing of the desk, of drawings or of the computation', (_, page) => {
    const sources = sourcesOf(page);
    expect(sources).toContain(page);
    expect(
      sources.filter((source) =>
        /fabric|flatbush|shared\/compute\/|features\/(desk|clean-up|drawings)\/|text\/desk|contract\/document/.test(
          source,
        ),
      ),
    ).toEqual([]);
  });

  it('the desk: neither the independent solution, nor what makes pictures and PDF, nor the clean-up', () => {
    const sources = sourcesOf('src/pages/desk/desk-page.tsx');
    expect(sources.some((source) => source.includes('/fabric/'))).toBe(true);
    expect(
      sources.filter((source) =>
        /pdf|shared\/compute\/(independent|mesh|solve|field)\/|png-writer|picture-painter|features\/clean-up\//.test(
          source,
        ),
      ),
    ).toEqual([]);
  });
});
