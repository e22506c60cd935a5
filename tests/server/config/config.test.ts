import { describe, expect, it } from 'vitest';
import { ConfigError, readConfig } from '#server/config/config.ts';

const good = { DATABASE_URL: 'postgres://owner@127.0.0.1/tracehead' };

function faultsOf(env: NodeJS.ProcessEnv): string {
  try {
    readConfig(env);
  } catch (error) {
    if (error instanceof ConfigError) return error.message;
    throw error;
  }
  return '';
}

describe('the settings', () => {
  it('name every fault at once, each with its variable', () => {
    const faults = faultsOf({
      NODE_ENV: 'staging',
      DATABASE_URL: 'mysql://elsewhere',
      PORT: '99999',
      PUBLIC_URL: 'ftp://files',
      SESSION_SECRET: 'short',
      SMTP_URL: 'mail.example',
      LOG_LEVEL: 'loud',
      MIN_FREE_BYTES: '1.5',
    });
    const named = faults
      .split('\n')
      .slice(1)
      .map((line) => line.trim().split(':')[0]);
    expect(named.sort()).toEqual([
      'DATABASE_URL',
      'LOG_LEVEL',
      'MIN_FREE_BYTES',
      'NODE_ENV',
      'PORT',
      'PUBLIC_URL',
      'SESSION_SECRET',
      'SMTP_URL',
    ]);
  });

  it('need a database', () => {
    expect(faultsOf({})).toMatch(/DATABASE_URL: must name a database/);
  });

  it('refuse production without a secret, and with one too short to be one', () => {
    expect(faultsOf({ ...good, NODE_ENV: 'production' })).toMatch(
      /SESSION_SECRET: must be set in production/,
    );
    expect(faultsOf({ ...good, NODE_ENV: 'production', SESSION_SECRET: 'x'.repeat(31) })).toMatch(
      /SESSION_SECRET: must have at least 32 characters/,
    );
    expect(readConfig({ ...good, NODE_ENV: 'production', SESSION_SECRET: 'x'.repeat(32) }).production).toBe(
      true,
    );
  });

  it('take an empty variable for one that was not set', () => {
    expect(readConfig({ ...good, PORT: '', SMTP_URL: '' })).toMatchObject({ port: 4180, smtpUrl: null });
  });

  it('give the server an address of its own when PUBLIC_URL says nothing', () => {
    expect(readConfig({ ...good, PORT: '4999' }).publicUrl).toBe('http://127.0.0.1:4999');
    expect(readConfig({ ...good, PUBLIC_URL: 'https://nets.example/' }).publicUrl).toBe(
      'https://nets.example',
    );
  });

  it("let a server do with the application's login alone", () => {
    const config = readConfig({ DATABASE_APP_URL: 'postgres://app@127.0.0.1/tracehead' });
    expect(config).toMatchObject({ databaseUrl: null, databaseAppUrl: 'postgres://app@127.0.0.1/tracehead' });
  });
});
