// The worker's health check: it serves no port, so ask whether this host's worker listens for work.
import { Client } from 'pg';
import { relayEnv } from '@/lib/env/env';

const client = new Client({ connectionString: relayEnv().RELAY_DATABASE_URL, connectionTimeoutMillis: 5000 });
await client.connect();
const { rows } = await client.query<{ listens: boolean }>(
  `select exists (
     select from pg_stat_activity
     where application_name = 'firstpull-listen' and usename = current_user
       and datname = current_database()
       and client_addr is not distinct from inet_client_addr()
   ) as listens`,
);
await client.end();
process.exit(rows[0].listens ? 0 : 1);
