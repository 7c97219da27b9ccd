import { withTenant } from '@/db/tenant';
import { appendEntry } from '@/lib/audit/append-entry';
import { updatePerson, type PersonChange } from '@/lib/auth/auth-data';
import type { PersonContext } from '@/lib/auth/context';
import { enterEveryWorkspace } from '@/lib/auth/enter';
import { parseInput } from '@/lib/http/read-input';
import { queueLive } from '@/lib/jobs/queue-live';
import { UpdateMeInput, type MeView } from './schemas';

/** Changes one's own name, units or time zone. Names already printed beside signatures stay as they were. */
export async function updateMe(ctx: PersonContext, input: unknown): Promise<Pick<MeView, 'person'>> {
  const change = parseInput(UpdateMeInput, input);
  if (change.name !== undefined && change.name !== ctx.person.name) await rename(ctx, change.name, change);
  else await updatePerson(ctx.person.id, change);
  return { person: { ...ctx.person, ...change } };
}

/** Writes the new name into the chain of every workspace that knew the old one. */
async function rename(ctx: PersonContext, to: string, change: PersonChange): Promise<void> {
  const { id, name } = ctx.person;
  const everywhere = await enterEveryWorkspace(ctx.person);
  await withTenant(ctx, async (tx) => {
    for (const inside of everywhere) {
      await queueLive(tx, inside, { name: 'people.changed', data: { id: inside.workspace.id } });
      await appendEntry(tx, inside, {
        action: 'person.renamed',
        subjectKind: 'person',
        subjectId: id,
        detail: { from: name, to },
      });
    }
    // Names belong to the identity role, whose connection is another. Inside, so that a change that fails
    // takes its entries back.
    await updatePerson(id, change);
  });
}
