import { spawn } from 'node:child_process';
import path from 'node:path';
import { text } from 'node:stream/consumers';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { createTestApp, type TestApp } from '#tests/support/test-app.ts';

const root = path.resolve(import.meta.dirname, '..', '..', '..');
const PASSWORD = 'a password of some length';
let app: TestApp;
beforeAll(async () => {
  app = await createTestApp();
});
afterAll(() => app.close());

async function run(args: string[], { env = {}, input = '' } = {}) {
  const child = spawn(
    process.execPath,
    ['--import', 'tsx', path.join(root, 'server', 'scripts', 'create-admin.ts'), ...args],
    {
      cwd: root,
      env: {
        PATH: process.env.PATH,
        DATABASE_URL: app.database.ownerUrl,
        PUBLIC_URL: 'http://tracehead.test',
        ...env,
      },
    },
  );
  child.stdin.end(input);
  const [out, err] = await Promise.all([text(child.stdout), text(child.stderr)]);
  return { code: child.exitCode ?? (await new Promise((resolve) => child.on('exit', resolve))), out, err };
}

async function sessionOf(email: string, password: string) {
  const caller = app.caller();
  await caller.open();
  return (await caller.post('/session', { email, password })).body;
}

describe('npm run create-admin', () => {
  it('makes an administrator with the password of the environment', async () => {
    const args = ['--email', 'Ada.Quist@harrow-fen.example', '--name', 'Ada Quist'];
    const { code, out } = await run(args, { env: { ADMIN_PASSWORD: PASSWORD } });
    expect([code, out]).toEqual([0, 'ada.quist@harrow-fen.example is an administrator.\n']);
    const { person } = await sessionOf('ada.quist@harrow-fen.example', PASSWORD);
    expect(person).toMatchObject({ name: 'Ada Quist', admin: true });
  });

  it('takes the password from standard input', async () => {
    const args = ['--email', 'b@harrow-fen.example', '--name', 'B', '--password-stdin'];
    expect((await run(args, { input: `${PASSWORD}\n` })).code).toBe(0);
    expect((await sessionOf('b@harrow-fen.example', PASSWORD)).person.admin).toBe(true);
  });

  it('otherwise prints a link through which the person chooses one', async () => {
    const { out } = await run(['--email', 'c@harrow-fen.example', '--name', 'C']);
    const token = /http:\/\/tracehead\.test\/invitation#([\w-]{43})\n/.exec(out)?.[1];
    const caller = app.caller();
    await caller.open();
    const accepted = await caller.post('/invitations/accept', { token, name: 'Cy', password: PASSWORD });
    expect(accepted.body.person).toMatchObject({ name: 'Cy', admin: true });
  });

  it('makes a person who is there an administrator, and leaves their password', async () => {
    const { person, caller } = await app.signIn('Dee');
    const { code, out } = await run(['--email', person.email, '--name', 'Dee']);
    expect([code, out.includes('#')]).toEqual([0, false]);
    expect((await caller.get('/session')).body.person.admin).toBe(true);
  });

  it('says what is wrong and changes nothing', async () => {
    const short = await run(['--email', 'e@harrow-fen.example', '--name', 'E'], {
      env: { ADMIN_PASSWORD: 'short' },
    });
    expect(short).toMatchObject({ code: 2 });
    expect(short.err).toContain('The password needs 10 to 200 characters.');
    expect((await run(['--email', 'nonsense', '--name', 'E'])).err).toContain('e-mail address is not valid');
    expect((await run(['--name', 'E'])).err).toContain('E-mail address is missing.');
    expect((await run(['--mail', 'x'])).err).toContain('Usage:');
    const [{ count }] = await app.db.query(
      `SELECT count(*) FROM person WHERE email = 'e@harrow-fen.example'`,
    );
    expect(count).toBe('0');
  });
});
