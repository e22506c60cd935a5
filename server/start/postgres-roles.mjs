import path from 'node:path';
import { faults } from './messages.mjs';
import { lastLines, runCommand } from './run-command.mjs';

/**
 * Makes the two roles and the database. It may be run again after it was cut off in the middle.
 * @param {string} binDir
 * @param {number} port
 * @param {import('./secrets.mjs').Secrets} secrets
 */
export async function prepareRoles(binDir, port, secrets) {
  await psql(binDir, port, secrets.superuserPassword, rolesSql(secrets));
}

/**
 * The owner is a member of the application's role so that migrations can hand things over to it. The
 * application owns nothing and so cannot switch a trigger off.
 * @param {import('./secrets.mjs').Secrets} secrets
 */
function rolesSql(secrets) {
  return `
    SELECT 'CREATE ROLE tracehead_owner LOGIN' WHERE NOT EXISTS
      (SELECT FROM pg_roles WHERE rolname = 'tracehead_owner') \\gexec
    SELECT 'CREATE ROLE tracehead_app LOGIN' WHERE NOT EXISTS
      (SELECT FROM pg_roles WHERE rolname = 'tracehead_app') \\gexec
    ALTER ROLE tracehead_owner PASSWORD '${secrets.ownerPassword}';
    ALTER ROLE tracehead_app PASSWORD '${secrets.appPassword}';
    GRANT tracehead_app TO tracehead_owner;
    SELECT 'CREATE DATABASE tracehead OWNER tracehead_owner' WHERE NOT EXISTS
      (SELECT FROM pg_database WHERE datname = 'tracehead') \\gexec
    REVOKE ALL ON DATABASE tracehead FROM PUBLIC;
    GRANT CONNECT, TEMPORARY ON DATABASE tracehead TO tracehead_app;
  `;
}

/**
 * The timestamps of the migrations that have run, newest first; empty before the first.
 * @param {string} binDir
 * @param {number} port
 * @param {string} ownerPassword
 * @returns {Promise<string[]>}
 */
export async function migrationsDone(binDir, port, ownerPassword) {
  const sql = `SELECT to_regclass('public.migration') IS NOT NULL AS made \\gset
    \\if :made
      SELECT "timestamp" FROM migration ORDER BY "timestamp" DESC;
    \\endif`;
  const output = await psql(binDir, port, ownerPassword, sql, 'tracehead_owner', 'tracehead');
  return output.split('\n').filter(Boolean);
}

/**
 * SQL goes in by standard input, so that no password shows in the list of processes.
 * @param {string} binDir @param {number} port @param {string} password @param {string} sql
 * @param {string} [role] @param {string} [database]
 */
async function psql(binDir, port, password, sql, role = 'postgres', database = 'postgres') {
  const args = ['-X', '-q', '-A', '-t', '-w', '-v', 'ON_ERROR_STOP=1', '-h', '127.0.0.1', '-p', String(port)];
  const env = { ...process.env, PGPASSWORD: password, PGCONNECT_TIMEOUT: '20', PGOPTIONS: '' };
  const answer = await runCommand(path.join(binDir, 'psql'), [...args, '-U', role, '-d', database], {
    env,
    input: sql,
    cwd: '/',
  });
  if (answer.code !== 0) throw faults.databaseStepFailed('prepared', lastLines(answer.output, 2));
  return answer.output;
}
