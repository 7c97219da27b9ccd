import { updatePerson } from '@/lib/auth/auth-data';
import type { PersonContext } from '@/lib/auth/context';
import { parseInput } from '@/lib/http/read-input';
import { UpdateMeInput, type MeView } from './schemas';

/** Changes one's own name, units or time zone. Names already printed beside signatures stay as they were. */
export async function updateMe(ctx: PersonContext, input: unknown): Promise<Pick<MeView, 'person'>> {
  const change = parseInput(UpdateMeInput, input);
  await updatePerson(ctx.person.id, change);
  return { person: { ...ctx.person, ...change } };
}
