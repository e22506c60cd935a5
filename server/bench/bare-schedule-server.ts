import type { AddressInfo } from 'node:net';
import express from 'express';
import pg from 'pg';

/**
 * What the schedule is measured against: Express and the query, without session, policy, computation or checked
 * reply. A process of its own, as the server is. BARE_DATABASE_URL and BARE_OWNERS tell it what to ask for.
 */
const pool = new pg.Pool({ connectionString: process.env.BARE_DATABASE_URL ?? '', max: 10 });
const owners = (process.env.BARE_OWNERS ?? '').split(',');

const app = express();
app.get('/', async (_req, res) => {
  const { rows } = await pool.query(
    'SELECT entity_id, version, value FROM document_entity WHERE owner_id = ANY($1) AND NOT removed',
    [owners],
  );
  res.json(rows);
});
const server = app.listen(0, '127.0.0.1', () => {
  process.send?.({ address: `http://127.0.0.1:${(server.address() as AddressInfo).port}` });
});
