// Makes roles and database, and brings the schema up to date: what a deployment runs before its web and worker processes.
// ADMIN_DATABASE_URL is an administrator of the cluster; the roles' passwords are those of the four other addresses.
import { z } from 'zod';
import { bootstrapDatabase, type DatabaseRole } from '@/db/bootstrap';
import { migrate } from '@/db/migrate';
import { readEnvironment } from '@/lib/env/read-environment';

const address = z.url({ protocol: /^postgres(ql)?$/, error: 'must be a PostgreSQL address' });
const urls = readEnvironment(
  z.object({
    ADMIN_DATABASE_URL: address,
    OWNER_DATABASE_URL: address,
    DATABASE_URL: address,
    AUTH_DATABASE_URL: address,
    RELAY_DATABASE_URL: address,
  }),
  process.env,
);

function passwordOf(url: string, role: DatabaseRole): string {
  const { username, password } = new URL(url);
  if (username === role && password) return decodeURIComponent(password);
  throw new Error(`One of the database addresses must name the role ${role} and its password.`);
}

await bootstrapDatabase({
  adminUrl: urls.ADMIN_DATABASE_URL,
  database: new URL(urls.OWNER_DATABASE_URL).pathname.slice(1),
  passwords: {
    firstpull_owner: passwordOf(urls.OWNER_DATABASE_URL, 'firstpull_owner'),
    firstpull_app: passwordOf(urls.DATABASE_URL, 'firstpull_app'),
    firstpull_auth: passwordOf(urls.AUTH_DATABASE_URL, 'firstpull_auth'),
    firstpull_relay: passwordOf(urls.RELAY_DATABASE_URL, 'firstpull_relay'),
  },
});
await migrate(urls.OWNER_DATABASE_URL);
process.stdout.write('The database is ready.\n');
process.exit(0);
