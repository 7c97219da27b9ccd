import { listMemberships } from '@/lib/auth/auth-data';
import type { PersonContext } from '@/lib/auth/context';
import type { MeView } from './schemas';

/** Who is signed in, and everything that they belong to. */
export async function myMemberships(ctx: PersonContext): Promise<MeView> {
  return { person: ctx.person, ...(await listMemberships(ctx.person.id)) };
}
