import { withTenant, type TenantTx } from '@/db/tenant';
import type { JobContext } from '@/lib/auth/context';
import { queueLive } from '@/lib/jobs/queue-live';
import { advanceGates } from './advance-gates';
import { openMustSettle } from './docket-data';
import { openPeopleGates, findLockDigest, signaturesOf, type OpenGateRow } from './gate-data';
import { workspacePeople } from './people-data';
import { reminderDue } from './reminder-due';
import { lockRevision, type RevisionRow } from './revision-data';
import { mailAbout } from './revision-mails';
import { activeStandIns } from './stand-in-data';
import { tellSigned } from './tell-signed';
import { isShort, makersOf, quorumReached, rightAt, type GateAt } from './who-signs';

/**
 * Looks after the open gates of a workspace when no command does: one passes when those whose names were missing have
 * left, leads hear of one that cannot pass any more, and whoever is asked is reminded on the day before its due day and
 * on the day itself. Two at once do no harm: rows are locked and mails go out once for an occasion.
 */
export async function lookAfterGates(ctx: JobContext, now = new Date()): Promise<void> {
  const { workspaceId } = ctx;
  const moves = await withTenant(ctx, async (tx) => {
    const open = await openPeopleGates(tx, workspaceId);
    if (!open.length) return [];
    const people = await workspacePeople(tx, workspaceId);
    const standIns = await activeStandIns(tx, workspaceId);
    const stuck: RevisionRow[] = [];
    for (const row of open) {
      const signed = await signaturesOf(tx, workspaceId, row.revision.id);
      const makers = makersOf(row.revision, { createdBy: row.meshBy });
      const at = { gate: row.gate, makers, people, standIns, signed };
      if (quorumReached(at) || isShort(at)) stuck.push(row.revision);
      else await remind(tx, ctx, row, at, now);
    }
    return stuck;
  });
  for (const revision of moves) await move(ctx, revision.id);
}

/** Advances one revision under its locks; whoever is concerned hears of a lock that nobody's signature made just now. */
async function move(ctx: JobContext, revisionId: string): Promise<void> {
  await withTenant(ctx, async (tx) => {
    const { template, revision } = await lockRevision(tx, ctx.workspaceId, revisionId);
    if (revision.state !== 'in_review') return;
    const passed = await advanceGates(tx, ctx, template, revision);
    if (!passed.length) return;
    const locked = (await findLockDigest(tx, ctx.workspaceId, revisionId)) !== null;
    const signature = (await signaturesOf(tx, ctx.workspaceId, revisionId)).at(-1);
    if (locked && signature) await tellSigned(tx, ctx, { template, revision, signature, locked });
    await queueLive(
      tx,
      ctx,
      { name: 'revision.changed', data: { id: revision.id, templateId: template.id } },
      { name: 'template.changed', data: { id: template.id } },
    );
  });
}

async function remind(
  tx: TenantTx,
  ctx: JobContext,
  { gate, revision, template }: OpenGateRow,
  at: GateAt,
  now: Date,
): Promise<void> {
  const { dueOn, openedAt } = gate;
  if (!dueOn || !openedAt) return;
  let openItems: number | null = null;
  for (const person of at.people) {
    const right = rightAt(at, person);
    const when = right && reminderDue({ dueOn, openedAt }, person.timeZone, now);
    if (!when) continue;
    const items = (openItems ??= (await openMustSettle(tx, revision.workspaceId, revision.id)).length);
    const about = { template, revision, occasion: `gate-due:${gate.id}:${when}` };
    await mailAbout(tx, ctx, [person], about, (base) => ({
      template: 'gate-due',
      ...base,
      gateName: gate.rule.name,
      dueOn,
      when,
      openItems: items,
      standsFor: right.standsFor?.name ?? null,
    }));
  }
}
