import { beforeAll, describe, expect, it } from 'vitest';
import { freshDatabase, type FreshDatabase } from '@/tests/support/database';

/**
 * Reads pg_catalog: the third and fourth lock of tenancy. Queries Q1 to Q4b as the project's tenancy rules name
 * them; the tenant columns are `workspace_id` and `studio_id`.
 */

/** Tables of no tenant: who is who, the tenants themselves, and the counters of requests. */
const withoutTenant = [
  'accounts',
  'rate_limits',
  'sessions',
  'studios',
  'two_factors',
  'users',
  'verifications',
  'workspaces',
];
/** Tables of the queue and of the migrations live in schemas of their own. */
const schemas = ['public', 'pgboss', 'drizzle'];
const roles = ['firstpull_app', 'firstpull_auth', 'firstpull_relay'];

let database: FreshDatabase;
const list = async (sql: string, values: unknown[] = []) => {
  const { rows } = await database.query<{ name: string }>(sql, values);
  return rows.map((row) => row.name).sort();
};
const tenantTables = `select a.attrelid, a.attnum, a.attname from pg_attribute a join pg_class c on c.oid = a.attrelid
  where c.relnamespace = 'public'::regnamespace and c.relkind in ('r', 'p') and not a.attisdropped
    and a.attname in ('workspace_id', 'studio_id') and c.relname <> 'workspaces'`;
/** The tenant columns as foreign keys meet them: in the tables of the tenants themselves it is the id. */
const tenantKeys = `${tenantTables} union all
  select a.attrelid, a.attnum, case a.attrelid when 'workspaces'::regclass then 'workspace_id' else 'studio_id' end
  from pg_attribute a where a.attname = 'id' and a.attrelid in ('workspaces'::regclass, 'studios'::regclass)
  union all select a.attrelid, a.attnum, a.attname from pg_attribute a
  where a.attname = 'studio_id' and a.attrelid = 'workspaces'::regclass`;
/** Unique beyond one tenant, each for a reason. */
const uniqueEverywhere = [
  'outbox_occasion', // the occasion of a mail: its keys are made of random ids and never told to a caller
];

beforeAll(async () => {
  database = await freshDatabase();
});

describe('tables', () => {
  it('live in known schemas only', async () => {
    const found = await list(
      `select n.nspname as name from pg_namespace n where n.nspname !~ '^pg_' and n.nspname <> 'information_schema'`,
    );
    expect(found).toEqual([...schemas].sort());
  });

  it('without a tenant column are exactly the listed ones', async () => {
    const found = await list(
      `select c.relname as name from pg_class c where c.relnamespace = 'public'::regnamespace
       and c.relkind in ('r', 'p') and c.oid not in (select attrelid from (${tenantTables}) t)`,
    );
    expect(found).toEqual(withoutTenant);
  });

  it('have row-level security on and forced, with a policy (Q1)', async () => {
    const all = await list(
      `select relname as name from pg_class where relnamespace = 'public'::regnamespace and relkind in ('r', 'p')`,
    );
    expect(all.length).toBeGreaterThan(30);
    const lacking = await list(
      `select c.relname as name from pg_class c where c.relnamespace = 'public'::regnamespace
       and c.relkind in ('r', 'p') and not (c.relrowsecurity and c.relforcerowsecurity
         and exists (select 1 from pg_policy p where p.polrelid = c.oid))`,
    );
    expect(lacking).toEqual([]);
  });

  it('have no tenant column that may be null, outbox aside', async () => {
    const found = await list(
      `select c.relname || '.' || a.attname as name from pg_attribute a join pg_class c on c.oid = a.attrelid
       where (a.attrelid, a.attnum) in (select attrelid, attnum from (${tenantTables}) t) and not a.attnotnull`,
    );
    expect(found).toEqual(['outbox.studio_id', 'outbox.workspace_id']);
  });
});

describe('roles', () => {
  it.each(roles)('%s is no superuser, bypasses nothing and makes nothing (Q2)', async (role) => {
    const { rows } = await database.query(
      `select rolsuper, rolbypassrls, rolcreatedb, rolcreaterole, rolreplication,
              has_schema_privilege(rolname, 'public', 'CREATE') as creates,
              pg_has_role(rolname, 'firstpull_owner', 'MEMBER') as owner_member
       from pg_roles where rolname = $1`,
      [role],
    );
    expect(rows).toEqual([
      {
        rolsuper: false,
        rolbypassrls: false,
        rolcreatedb: false,
        rolcreaterole: false,
        rolreplication: false,
        creates: false,
        owner_member: false,
      },
    ]);
  });

  it('own no table; only the policy functions belong to the role that reads memberships', async () => {
    const relations = await list(
      `select c.relname as name from pg_class c join pg_roles r on r.oid = c.relowner
       where r.rolname = any($1) and c.relkind in ('r', 'p', 'v', 'm', 'S', 'i')`,
      [roles],
    );
    expect(relations).toEqual([]);
    const functions = await list(
      `select p.proname as name from pg_proc p join pg_roles r on r.oid = p.proowner
       where r.rolname in ('firstpull_app', 'firstpull_relay')`,
    );
    expect(functions).toEqual([]);
  });

  it('firstpull_app is a member of no other role', async () => {
    const found = await list(
      `select r.rolname as name from pg_roles r where r.rolname <> 'firstpull_app'
       and pg_has_role('firstpull_app', r.oid, 'MEMBER')`,
    );
    expect(found).toEqual([]);
  });
});

describe('policies', () => {
  it('that let a role write check what is written, and those that let it read check what is read', async () => {
    const found = await list(
      `select polrelid::regclass || ':' || polname as name from pg_policy
       where (polcmd in ('*', 'a', 'w') and polwithcheck is null) or (polcmd in ('*', 'r', 'w', 'd') and polqual is null)`,
    );
    expect(found).toEqual([]);
  });

  it('of the application are never simply true', async () => {
    const found = await list(
      `select p.polrelid::regclass || ':' || p.polname as name from pg_policy p
       where (select oid from pg_roles where rolname = 'firstpull_app') = any(p.polroles)
         and (pg_get_expr(p.polqual, p.polrelid) = 'true' or pg_get_expr(p.polwithcheck, p.polrelid) = 'true')`,
    );
    expect(found).toEqual([]);
  });

  it('of the tables that carry a tenant name that column', async () => {
    const found = await list(
      `select c.relname as name from pg_class c where c.oid in (select attrelid from (${tenantTables}) t)
       and not exists (select 1 from pg_policy p where p.polrelid = c.oid and p.polcmd = '*'
         and pg_get_expr(p.polqual, p.polrelid) ~ '(workspace_id|studio_id) = ANY')`,
    );
    expect(found).toEqual([]);
  });

  it('are granted to named roles, never to everybody', async () => {
    const found = await list(
      `select polrelid::regclass || ':' || polname as name from pg_policy where 0 = any(polroles)`,
    );
    expect(found).toEqual([]);
  });
});

describe('ways around the policies', () => {
  it('views run with the rights of who asks, and no materialized view stands (Q3)', async () => {
    const found = await list(
      `select c.relname as name from pg_class c where c.relnamespace = 'public'::regnamespace
       and (c.relkind = 'm' or (c.relkind = 'v' and not coalesce(c.reloptions && array['security_invoker=true', 'security_invoker=on'], false)))`,
    );
    expect(found).toEqual([]);
  });

  it('functions that run as their owner are the listed ones, with a fixed search path (Q3)', async () => {
    const definers = await list(
      `select p.proname as name from pg_proc p where p.prosecdef and p.pronamespace = 'public'::regnamespace`,
    );
    expect(definers).toEqual([
      'app_people',
      'app_studios',
      'app_workspaces',
      'staff_into_workspaces',
      'studio_is_empty',
      'studio_keeps_a_lead',
      'workspace_gets_staff',
    ]);
    const loose = await list(
      `select p.proname as name from pg_proc p where p.pronamespace = 'public'::regnamespace
       and not coalesce(array_to_string(p.proconfig, ',') like '%search_path=%', false)`,
    );
    expect(loose).toEqual([]);
  });

  it('foreign keys between tables of a tenant carry the tenant column on both sides (Q4)', async () => {
    const found = await list(
      `with tenant as (${tenantKeys})
       select k.conrelid::regclass || ':' || k.conname as name from pg_constraint k
       where k.contype = 'f' and k.conrelid in (select attrelid from tenant) and k.confrelid in (select attrelid from tenant)
         and not exists (select 1 from unnest(k.conkey, k.confkey) u(a, b)
           join tenant x on x.attrelid = k.conrelid and x.attnum = u.a
           join tenant y on y.attrelid = k.confrelid and y.attnum = u.b and y.attname = x.attname)`,
    );
    expect(found).toEqual([]);
  });

  it('unique indexes lead with the tenant column or are a random key (Q4b)', async () => {
    const found = await list(
      `with tenant as (${tenantTables})
       select i.indexrelid::regclass::text as name from pg_index i
       where i.indisunique and i.indrelid in (select attrelid from tenant)
         and not exists (select 1 from tenant t where t.attrelid = i.indrelid and t.attnum = i.indkey[0])
         and not (i.indisprimary and i.indnatts = 1 and (select atttypid from pg_attribute a
           where a.attrelid = i.indrelid and a.attnum = i.indkey[0]) = 'uuid'::regtype)`,
    );
    expect(found).toEqual(uniqueEverywhere);
  });

  it('the application has no right to truncate, reference or trigger anywhere', async () => {
    const found = await list(
      `select table_name || ':' || privilege_type as name from information_schema.role_table_grants
       where grantee in ('firstpull_app', 'PUBLIC') and table_schema = 'public'
         and privilege_type in ('TRUNCATE', 'REFERENCES', 'TRIGGER')`,
    );
    expect(found).toEqual([]);
  });
});
