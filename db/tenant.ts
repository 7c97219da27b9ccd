import { sql, type ExtractTablesWithRelations } from 'drizzle-orm';
import type { NodePgQueryResultHKT } from 'drizzle-orm/node-postgres';
import type { PgTransaction } from 'drizzle-orm/pg-core';
import { appDatabase } from './client';
import type { Scope } from './scope';

declare const tenanted: unique symbol;
type EmptySchema = Record<string, never>;

/** The only handle that a data file accepts: a transaction whose row policies know what it may see. */
export type TenantTx = PgTransaction<
  NodePgQueryResultHKT,
  EmptySchema,
  ExtractTablesWithRelations<EmptySchema>
> & {
  readonly [tenanted]: true;
};

/**
 * Runs `fn` in one transaction that sees exactly what `ctx.scope` allows. No network, store, mail or
 * engine work belongs inside: it would hold the row locks.
 */
export async function withTenant<T>(
  ctx: { readonly scope: Scope },
  fn: (tx: TenantTx) => Promise<T>,
): Promise<T> {
  return appDatabase().transaction(async (tx) => {
    await enterScope(tx as unknown as TenantTx, ctx.scope);
    return fn(tx as unknown as TenantTx);
  });
}

/**
 * Changes what the rest of a transaction sees. For a verb that goes through several workspaces, or whose own
 * change gives or takes the sight of them; each scope comes from a context, as in `withTenant`.
 */
export async function enterScope(tx: TenantTx, scope: Scope): Promise<void> {
  const person = 'personId' in scope ? scope.personId : '';
  const workspace = scope.kind === 'workspace' ? scope.workspaceId : '';
  const studio = scope.kind === 'studio' ? scope.studioId : '';
  const jobWorkspace = scope.kind === 'job' ? scope.workspaceId : '';
  const jobStudio = scope.kind === 'studio-job' ? scope.studioId : '';
  await tx.execute(sql`select
    set_config('app.person', ${person}, true),
    set_config('app.workspace', ${workspace}, true),
    set_config('app.studio', ${studio}, true),
    set_config('app.job_workspace', ${jobWorkspace}, true),
    set_config('app.job_studio', ${jobStudio}, true)`);
}
