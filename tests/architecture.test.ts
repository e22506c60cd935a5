import { readdirSync, readFileSync } from 'node:fs';
import path from 'node:path';
import { describe, expect, it } from 'vitest';

/**
 * Reads every import of the project and holds it against the rooms in DEVELOPERS.md. A rule names who may import
 * what; whatever no rule allows is a fault, so that a new folder has to be thought about.
 */
const root = path.resolve(import.meta.dirname, '..');
const ROOMS = ['shared', 'server', 'src', 'tests'];
const ALIASES: Record<string, string> = { shared: 'shared', server: 'server', client: 'src', tests: 'tests' };

interface Import {
  from: string;
  /** Path from the project's root for our own files, otherwise the package's name. */
  to: string;
  ours: boolean;
  /** A type import leaves nothing behind in the running program. */
  typeOnly: boolean;
}

function filesUnder(folder: string): string[] {
  return readdirSync(path.join(root, folder), { recursive: true, withFileTypes: true })
    .filter((entry) => entry.isFile() && /\.(ts|tsx|mjs)$/.test(entry.name))
    .map((entry) => path.relative(root, path.join(entry.parentPath, entry.name)));
}

const IMPORT = /^(?:import|export)\s+(type\s)?(?:[^'"();]*?\sfrom\s+)?['"]([^'"]+)['"]/gm;
const DYNAMIC = /\bimport\(\s*['"]([^'"]+)['"]\s*\)/g;

function importsOf(file: string): Import[] {
  const text = readFileSync(path.join(root, file), 'utf8');
  const found = [
    ...[...text.matchAll(IMPORT)].map((match) => ({ name: match[2] ?? '', typeOnly: Boolean(match[1]) })),
    ...[...text.matchAll(DYNAMIC)].map((match) => ({ name: match[1] ?? '', typeOnly: false })),
  ];
  return found.map(({ name, typeOnly }) => ({ from: file, typeOnly, ...resolved(file, name) }));
}

function resolved(file: string, name: string): { to: string; ours: boolean } {
  const alias = /^#(\w+)\/(.+)$/.exec(name);
  if (alias) return { to: path.join(ALIASES[alias[1] ?? ''] ?? 'unknown', alias[2] ?? ''), ours: true };
  if (name.startsWith('.')) return { to: path.normalize(path.join(path.dirname(file), name)), ours: true };
  return { to: name, ours: false };
}

const files = ROOMS.flatMap(filesUnder);
const imports = files.flatMap(importsOf);
const from = (prefix: string) => imports.filter((each) => each.from.startsWith(prefix));
const says = (each: Import) => `${each.from} imports ${each.to}`;
const inRoom = (each: Import, ...prefixes: string[]) =>
  prefixes.some((prefix) => each.to === prefix || each.to.startsWith(`${prefix}/`));
const packageOf = (name: string) => name.split('/', name.startsWith('@') ? 2 : 1).join('/');

/** Only these make concrete adapters and hand them on. */
const COMPOSERS = /^server\/(main|composition)\.ts$|^server\/(scripts|bench)\//;

describe('the project', () => {
  it('has imports to look at in every room', () => {
    for (const room of ROOMS) expect(from(`${room}/`).length, room).toBeGreaterThan(0);
  });

  it('has files named in kebab-case', () => {
    const misnamed = files.filter(
      (file) => !/^[a-z0-9]+(-[a-z0-9]+)*(\.[a-z0-9]+)*$/.test(path.basename(file)),
    );
    expect(misnamed).toEqual([]);
  });
});

describe('the rooms', () => {
  it('shared imports nothing of ours but itself, no Node and no DOM library', () => {
    const allowed = new Set([
      'zod',
      'delaunator',
      '@kninnug/constrainautor',
      'robust-predicates',
      'flatbush',
      'uuid',
      'canonicalize',
    ]);
    const faults = from('shared/').filter((each) =>
      each.ours ? !inRoom(each, 'shared') : !allowed.has(packageOf(each.to)),
    );
    expect(faults.map(says)).toEqual([]);
  });

  it('shared/compute takes the contract and the words for figures, and is otherwise pure', () => {
    const faults = from('shared/compute/').filter(
      (each) =>
        each.ours && !each.typeOnly && !inRoom(each, 'shared/compute', 'shared/contract', 'shared/text'),
    );
    expect(faults.map(says)).toEqual([]);
  });

  it('the server and the client never meet', () => {
    const faults = [
      ...from('server/').filter((each) => each.ours && !inRoom(each, 'server', 'shared')),
      ...from('src/').filter((each) => each.ours && !inRoom(each, 'src', 'shared')),
    ];
    expect(faults.map(says)).toEqual([]);
  });

  it('nothing imports the tests', () => {
    const faults = imports.filter((each) => !each.from.startsWith('tests/') && inRoom(each, 'tests'));
    expect(faults.map(says)).toEqual([]);
  });

  it('the start scripts use nothing but what Node brings, since they run before packages are there', () => {
    const faults = from('server/start/').filter((each) =>
      each.ours ? !inRoom(each, 'server/start') : !each.to.startsWith('node:'),
    );
    expect(faults.map(says)).toEqual([]);
  });
});

describe('inside the server', () => {
  it('routes reach the database only through services', () => {
    const faults = from('server/routes/').filter((each) =>
      each.ours
        ? !inRoom(
            each,
            'server/routes',
            'server/services',
            'server/policies',
            'server/http',
            'server/errors',
            'server/app-deps.ts',
            'shared',
          ) && !each.typeOnly
        : ['typeorm', 'pg'].includes(packageOf(each.to)) && !each.typeOnly,
    );
    expect(faults.map(says)).toEqual([]);
  });

  it('services know ports, never the adapters behind them, and never a route', () => {
    const adapter = /^server\/(storage|mail|jobs|live|imaging)\//;
    const port = /(-port|-keys)\.ts$|\/templates\//;
    const faults = from('server/services/').filter(
      (each) =>
        each.ours &&
        !each.typeOnly &&
        (inRoom(each, 'server/routes', 'server/main.ts', 'server/app.ts') ||
          (adapter.test(each.to) && !port.test(each.to))),
    );
    expect(faults.map(says)).toEqual([]);
  });

  it('entities, migrations and policies know nothing above them', () => {
    const faults = [
      ...from('server/entities/').filter(
        (each) => each.ours && !inRoom(each, 'server/entities', 'server/migrations', 'shared'),
      ),
      ...from('server/migrations/').filter((each) => each.ours && !inRoom(each, 'server/migrations')),
      ...from('server/policies/').filter(
        (each) =>
          each.ours &&
          !inRoom(each, 'server/policies', 'server/errors', 'shared') &&
          !(each.typeOnly && inRoom(each, 'server/entities', 'server/http')),
      ),
    ];
    expect(faults.map(says)).toEqual([]);
  });

  it('only the processes make concrete adapters', () => {
    // A job's handler is a use case that the queue calls, and no adapter.
    const adapter = /^server\/(storage|mail|jobs|live)\/(?!handlers\/|templates\/|.*(-port|-keys)\.ts$)/;
    const room = (file: string) => file.split('/', 2).join('/');
    const faults = from('server/').filter(
      (each) =>
        each.ours &&
        !each.typeOnly &&
        adapter.test(each.to) &&
        room(each.from) !== room(each.to) &&
        !COMPOSERS.test(each.from),
    );
    expect(faults.map(says)).toEqual([]);
  });
});

describe('inside the client', () => {
  const order = ['src/pages', 'src/features', 'src/layouts', 'src/components', 'src/lib'];

  it('imports go from pages to features to components and lib, never back up', () => {
    const faults = imports.filter((each) => {
      const low = order.findIndex((room) => each.from.startsWith(`${room}/`));
      const high = order.findIndex((room) => inRoom(each, room));
      return low >= 0 && high >= 0 && high < low;
    });
    expect(faults.map(says)).toEqual([]);
  });

  it('a feature never imports its sibling', () => {
    const feature = (file: string) => /^src\/features\/([^/]+)\//.exec(file)?.[1];
    const faults = imports.filter((each) => {
      const [own, other] = [feature(each.from), feature(each.to)];
      return own !== undefined && other !== undefined && own !== other;
    });
    expect(faults.map(says)).toEqual([]);
  });

  it("the desk's model and tools know neither React nor fabric", () => {
    const faults = [...from('src/features/desk/model/'), ...from('src/features/desk/tools/')].filter((each) =>
      ['react', 'react-dom', 'fabric'].includes(packageOf(each.to)),
    );
    expect(faults.map(says)).toEqual([]);
  });

  it('fabric is imported in one place', () => {
    const faults = from('src/').filter(
      (each) => packageOf(each.to) === 'fabric' && !each.from.startsWith('src/features/desk/render/'),
    );
    expect(faults.map(says)).toEqual([]);
  });
});
