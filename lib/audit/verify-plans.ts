import { withTenant } from '@/db/tenant';
import type { JobContext } from '@/lib/auth/context';
import { sameJson } from './same-json';
import { plansOf, subjectsOf } from './verify-data';

/** Holds every version of the gate plan against the entry that made it, and the other way round. */
export async function planFaults(ctx: JobContext): Promise<string[]> {
  const { workspaceId } = ctx;
  const { plans, made } = await withTenant(ctx, async (tx) => ({
    plans: await plansOf(tx, workspaceId),
    made: [
      ...(await subjectsOf(tx, workspaceId, 'gate-plan.made')),
      ...(await subjectsOf(tx, workspaceId, 'gate-plan.changed')),
    ],
  }));
  const faults: string[] = [];
  for (const plan of plans) {
    const entry = made.find(({ subjectId }) => subjectId === plan.id);
    const { number, gates, after } = (entry?.detail ?? {}) as {
      number?: number;
      gates?: unknown;
      after?: { gates?: unknown };
    };
    if (!entry) faults.push(`gate plan ${plan.number}: it has no entry in the audit chain`);
    else if (number !== plan.number || !sameJson(after?.gates ?? gates, plan.gates))
      faults.push(`gate plan ${plan.number}: it is not as the audit chain has it`);
  }
  for (const { subjectId, seq, detail } of made)
    if (!plans.some(({ id }) => id === subjectId))
      faults.push(`gate plan ${String(detail.number)} of entry ${seq} is missing`);
  return faults;
}
