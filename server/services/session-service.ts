import { readFile } from 'node:fs/promises';
import path from 'node:path';
import * as z from 'zod/mini';
import type { AppConfig } from '#server/config/config.ts';
import type { Actor } from '#server/http/route-record.ts';
import { globalActionsFor } from '#server/policies/dam-policy.ts';
import { type SessionDto, sessionDto } from '#shared/contract/people.ts';

/** The seed writes this file; without it there is no demo. */
export const DEMO_SIGN_INS_FILE = 'demo-sign-ins.json';

async function readDemoSignIns(config: AppConfig): Promise<SessionDto['demoSignIns']> {
  if (config.production) return [];
  try {
    const text = await readFile(path.join(config.storageDir, DEMO_SIGN_INS_FILE), 'utf8');
    return z.parse(sessionDto.shape.demoSignIns, JSON.parse(text));
  } catch (error) {
    if (error instanceof Error && 'code' in error && error.code === 'ENOENT') return [];
    throw error;
  }
}

/** What a page needs to know about whoever looks at it. */
export async function describeSession(
  config: AppConfig,
  person: Actor | null,
  csrfToken: string,
): Promise<SessionDto> {
  return {
    person,
    csrfToken,
    can: person ? globalActionsFor(person) : [],
    demoSignIns: person ? [] : await readDemoSignIns(config),
    outboxReadable: config.smtpUrl === null && !config.production,
  };
}
