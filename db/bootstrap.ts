import { Client, escapeIdentifier, escapeLiteral } from 'pg';

export const databaseRoles = [
  'firstpull_owner',
  'firstpull_app',
  'firstpull_auth',
  'firstpull_relay',
] as const;
export type DatabaseRole = (typeof databaseRoles)[number];

export type BootstrapInput = {
  /** A superuser's (or a managed service's administrator's) URL to any database of the cluster. */
  adminUrl: string;
  /** Name of the database to make. */
  database: string;
  passwords: Record<DatabaseRole, string>;
  /** Copy this database instead of an empty one (tests). */
  template?: string;
};

/** Removes a database with all that is in it, ending the connections to it. */
export async function dropDatabase(adminUrl: string, database: string): Promise<void> {
  const admin = new Client({ connectionString: adminUrl });
  await admin.connect();
  try {
    await admin.query(`drop database if exists ${escapeIdentifier(database)} with (force)`);
  } finally {
    await admin.end();
  }
}

/**
 * Makes the roles and the database, once; running it again only sets the passwords anew.
 * The owner migrates; the other three own nothing and cannot bypass row policies.
 */
export async function bootstrapDatabase({
  adminUrl,
  database,
  passwords,
  template,
}: BootstrapInput): Promise<void> {
  const admin = new Client({ connectionString: adminUrl });
  await admin.connect();
  try {
    for (const role of databaseRoles) {
      const known = await admin.query('select 1 from pg_roles where rolname = $1', [role]);
      const options = 'login nosuperuser nocreatedb nocreaterole noreplication nobypassrls';
      await admin.query(
        `${known.rowCount ? 'alter' : 'create'} role ${escapeIdentifier(role)} ${options} password ${escapeLiteral(passwords[role])}`,
      );
    }
    // Lets the migrations hand the policy functions to the role that may read memberships.
    await admin.query('grant firstpull_auth to firstpull_owner');
    const exists = await admin.query('select 1 from pg_database where datname = $1', [database]);
    if (!exists.rowCount) {
      const from = template ? ` template ${escapeIdentifier(template)}` : '';
      await admin.query(`create database ${escapeIdentifier(database)} owner firstpull_owner${from}`);
    }
    await admin.query(`revoke all on database ${escapeIdentifier(database)} from public`);
    await admin.query(
      `grant connect on database ${escapeIdentifier(database)} to firstpull_app, firstpull_auth, firstpull_relay`,
    );
  } finally {
    await admin.end();
  }
  const inside = new URL(adminUrl);
  inside.pathname = `/${database}`;
  const client = new Client({ connectionString: inside.href });
  await client.connect();
  try {
    await client.query('revoke create on schema public from public');
    await client.query('alter schema public owner to firstpull_owner');
  } finally {
    await client.end();
  }
}
