import { statSync } from 'node:fs';
import { networkInterfaces } from 'node:os';
import { connect } from 'node:net';
import { Client } from 'pg';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { env } from '@/lib/env';
import { dataFolder } from '../../scripts/set-up/tell.mjs';

let login: Client;

beforeAll(async () => {
  login = new Client({ connectionString: env().DATABASE_URL });
  await login.connect();
});

afterAll(() => login.end());

it('the application signs in as a plain role that owns nothing and passes no row-level security', async () => {
  const { rows } = await login.query('select rolsuper, rolbypassrls, rolcreatedb, rolcreaterole, rolreplication from pg_roles where rolname = current_user');
  expect(rows).toEqual([{ rolsuper: false, rolbypassrls: false, rolcreatedb: false, rolcreaterole: false, rolreplication: false }]);
  const owned = await login.query(`select relname from pg_class where relowner = (select oid from pg_roles where rolname = current_user)`);
  expect(owned.rows).toEqual([]);
  const groups = await login.query(`select r.rolname from pg_auth_members m join pg_roles r on r.oid = m.roleid where m.member = current_user::regrole`);
  expect(groups.rows).toEqual([{ rolname: 'app_rw' }]);
});

it('the owner of the tables is no superuser', async () => {
  const { rows } = await login.query(`select rolsuper from pg_roles where rolname = 'app_owner'`);
  expect(rows).toEqual([{ rolsuper: false }]);
});

it('a wrong password is refused, and passwords are kept where only this user reads them', async () => {
  const wrong = new URL(env().DATABASE_URL);
  wrong.password = 'wrong';
  await expect(new Client({ connectionString: wrong.href }).connect()).rejects.toMatchObject({ code: '28P01' });
  expect(statSync(`${dataFolder}/secrets`).mode & 0o777).toBe(0o700);
  expect(statSync(`${dataFolder}/secrets/pg-test.json`).mode & 0o777).toBe(0o600);
});

it('the cluster answers on the loopback alone', async () => {
  const { rows } = await login.query<{ listen_addresses: string }>('show listen_addresses');
  expect(rows).toEqual([{ listen_addresses: '127.0.0.1' }]);
  const port = Number(new URL(env().DATABASE_URL).port);
  const outer = Object.values(networkInterfaces()).flat().filter((face) => face && !face.internal && face.family === 'IPv4');
  for (const face of outer) {
    const answer = await new Promise((resolve) => {
      const socket = connect({ host: face?.address, port, timeout: 2000 });
      socket.once('connect', () => resolve('connected'));
      socket.once('error', () => resolve('refused'));
      socket.once('timeout', () => resolve('silent'));
    });
    expect(answer).not.toBe('connected');
  }
});
