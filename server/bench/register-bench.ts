import pg from 'pg';
import type { RegisterPage } from '#shared/contract/register.ts';
import { type ApiClient, signInAtDam } from './api-client.ts';
import { type Bench, type BenchRow, percentile } from './bench.ts';
import { openBenchStand } from './bench-stand.ts';
import { DAMS_SEEN, DRAWINGS_OF_DAM, seedRegister } from './register-seed.ts';

/** Each question is asked so often, after once that is not counted. */
const TIMES = 12;
const SHARE = 0.95;

/** A question to the API, and the bare query of the same rows: ids by index, without access, names, notes and count. */
interface Question {
  path: string;
  where: string;
  order?: string;
}

const SEARCHES = [
  'BD-118/03',
  'bd 20',
  'toe drain',
  'spillway apro',
  'inclinometer',
  'reference 512',
  'flood 1978 blanket',
  'C–C full sup',
  'dam of the bench 7 uplift',
  'nothing like it',
];
const STATES = ['bare', 'draft', 'sent', 'returned', 'accepted'];

const LISTS: Question[] = [
  { path: '', where: 'true' },
  { path: 'sort=newest', where: 'true', order: 'at DESC, id DESC' },
  { path: 'sort=dam', where: 'true', order: 'dam_key, sort_key, id' },
];
const filters = (dam: string): Question[] => [
  ...STATES.map((state) => ({ path: `state=${state}`, where: `states @> ARRAY['${state}']` })),
  ...['drawing', 'section', 'net'].map((kind) => ({ path: `kind=${kind}`, where: `kind = '${kind}'` })),
  { path: `dam=${dam}&sort=newest`, where: `dam_id = '${dam}'`, order: 'at DESC, id DESC' },
  { path: `dam=${dam}&state=returned&kind=net`, where: `dam_id = '${dam}' AND states @> ARRAY['returned']` },
  { path: 'whose=me&kind=net', where: `kind = 'net'` },
];
const searches = (): Question[] =>
  SEARCHES.map((words) => ({
    path: `q=${encodeURIComponent(words)}`,
    where: `words @@ search_query('${words}')`,
  }));

async function measure(questions: readonly Question[], ask: (question: Question) => Promise<unknown>) {
  const times: number[] = [];
  for (let turn = 0; turn <= TIMES; turn++)
    for (const question of questions) {
      const began = performance.now();
      await ask(question);
      if (turn > 0) times.push(performance.now() - began);
    }
  return times;
}

/** Goes on through the pages of the whole register, as somebody does who leafs through it. */
async function leafThrough(client: ApiClient, pages: number): Promise<number[]> {
  const times: number[] = [];
  let cursor = '';
  for (let page = 0; page < pages; page++) {
    const began = performance.now();
    const { nextCursor } = await client.get<RegisterPage>(`/register?${cursor}`);
    times.push(performance.now() - began);
    cursor = `cursor=${nextCursor}`;
  }
  return times;
}

function rowOf(name: string, ours: number[], bare: number[]): BenchRow {
  const [value, reference] = [percentile(ours, SHARE), percentile(bare, SHARE)];
  return { name, value, unit: 'ms', reference, ratio: value / reference, samples: ours.length };
}

export const register: Bench = {
  name: 'register',
  about: `list, filter and search in ${DAMS_SEEN * DRAWINGS_OF_DAM} drawings and some 60,000 sections and nets over HTTP, ms at the 95th percentile, beside the bare indexed query of the same ids through pg`,
  async run(): Promise<BenchRow[]> {
    const stand = await openBenchStand();
    const db = new pg.Client({ connectionString: stand.appUrl });
    try {
      const client = await signInAtDam(stand);
      await seedRegister(stand, client);
      await db.connect();
      const { rows } = await db.query('SELECT dam_id FROM membership WHERE person_id = $1 ORDER BY dam_id', [
        client.personId,
      ]);
      const seen = rows.map((row) => row.dam_id);
      const bare = ({ where, order = 'sort_key, id' }: Question) =>
        db.query(
          `SELECT id FROM register_entry WHERE dam_id = ANY ($1) AND NOT archived AND ${where} ORDER BY ${order} LIMIT 51`,
          [seen],
        );
      const ours = ({ path }: Question) => client.get<RegisterPage>(`/register?${path}`);
      const both = async (name: string, questions: Question[]) =>
        rowOf(name, await measure(questions, ours), await measure(questions, bare));
      return [
        await both('register-list', LISTS),
        rowOf('register-leaf', await leafThrough(client, 100), await measure(LISTS.slice(0, 1), bare)),
        await both('register-filter', filters(seen[7])),
        await both('register-search', searches()),
      ];
    } finally {
      await db.end();
      await stand.close();
    }
  },
};
