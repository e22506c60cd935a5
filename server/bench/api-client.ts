import { hash } from '@node-rs/argon2';
import { v7 as uuidv7 } from 'uuid';
import { DamEntity, MembershipEntity } from '#server/entities/dam-entity.ts';
import { createDataSource } from '#server/entities/data-source.ts';
import { PersonEntity } from '#server/entities/person-entity.ts';
import type { BenchStand } from './bench-stand.ts';

const PASSWORD = 'measured, not guessed';

/** A signed-in engineer of a dam of his own, speaking to the API as a browser does. */
export interface ApiClient {
  damId: string;
  personId: string;
  email: string;
  password: string;
  cookie: string;
  get<T>(path: string): Promise<T>;
  getBytes(path: string): Promise<ArrayBuffer>;
  /** The answer while it still comes, as a stream of events does. */
  open(path: string, signal: AbortSignal): Promise<Response>;
  post<T>(path: string, body: object | FormData): Promise<T>;
}

export async function signInAtDam(stand: BenchStand): Promise<ApiClient> {
  const people = await makePeople(stand);
  let [cookie, csrfToken] = ['', ''];
  const call = async (method: string, path: string, body?: object | FormData, signal?: AbortSignal) => {
    const isForm = body instanceof FormData;
    const response = await fetch(`${stand.address}/api/v1${path}`, {
      method,
      headers: {
        cookie,
        'X-CSRF-Token': csrfToken,
        ...(isForm ? {} : { 'Content-Type': 'application/json' }),
      },
      ...(body ? { body: isForm ? body : JSON.stringify(body) } : {}),
      ...(signal ? { signal } : {}),
    });
    const set = response.headers.getSetCookie()[0];
    if (set) cookie = set.split(';')[0] ?? cookie;
    if (!response.ok)
      throw new Error(`${method} ${path} answered ${response.status}: ${await response.text()}`);
    return response;
  };
  const renewToken = async () => {
    csrfToken = ((await (await call('GET', '/session')).json()) as { csrfToken: string }).csrfToken;
  };
  await renewToken();
  await call('POST', '/session', { email: people.email, password: PASSWORD });
  await renewToken();
  return {
    ...people,
    password: PASSWORD,
    cookie,
    get: async <T>(path: string) => (await (await call('GET', path)).json()) as T,
    getBytes: async (path) => (await call('GET', path)).arrayBuffer(),
    open: (path, signal) => call('GET', path, undefined, signal),
    post: async <T>(path: string, body: object | FormData) =>
      (await (await call('POST', path, body)).json()) as T,
  };
}

async function makePeople({ ownerUrl }: BenchStand) {
  const [personId, damId] = [uuidv7(), uuidv7()];
  const email = `${personId}@bench.example`;
  const db = await createDataSource({ url: ownerUrl, poolSize: 1 }).initialize();
  await db
    .getRepository(PersonEntity)
    .insert({ id: personId, email, name: 'Bench', passwordHash: await hash(PASSWORD), admin: false });
  await db.getRepository(DamEntity).insert({
    id: damId,
    name: 'Bench',
    unitSystem: 'SI',
    datum: 'local',
    fullSupplyLevel: 100,
    gammaW: 9.81,
    createdBy: personId,
  });
  await db.getRepository(MembershipEntity).insert({ damId, personId, roles: ['engineer'] });
  await db.destroy();
  return { personId, damId, email };
}
