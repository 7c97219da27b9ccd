import { uuidv7 } from 'uuidv7';
import { withTenant } from '@/db/tenant';
import type { PersonContext, Studio } from '@/lib/auth/context';
import { conflict } from '@/lib/errors/app-error';
import { parseInput } from '@/lib/http/read-input';
import { makeSlug } from '@/lib/workspaces/make-slug';
import { insertItem, insertLimits } from './library-data';
import { libraryKinds, OpenStudioInput } from './schemas';
import { startingLibrary } from './starting-library';
import { insertStaff, insertStudio, insertStudioEntry } from './studio-data';

/** Opens a studio with its starting library; whoever opens it is its first lead. */
export async function openStudio(ctx: PersonContext, input: unknown): Promise<Studio> {
  const { name, timeZone } = parseInput(OpenStudioInput, input);
  return withTenant(ctx, async (tx) => {
    const studio = {
      id: uuidv7(),
      name,
      slug: makeSlug(name),
      timeZone: timeZone ?? ctx.person.timeZone,
    };
    let made = await insertStudio(tx, studio);
    for (let tries = 1; !made && tries < 4; tries++)
      made = await insertStudio(tx, Object.assign(studio, { slug: makeSlug(name) }));
    if (!made) throw conflict('try-again', 'No free address was found for this name. Try again.');
    await insertStaff(tx, { id: uuidv7(), studioId: studio.id, userId: ctx.person.id, role: 'lead' });
    for (const kind of libraryKinds)
      for (const item of startingLibrary[kind])
        await insertItem(tx, kind, { ...item, id: uuidv7(), studioId: studio.id });
    await insertLimits(tx, studio.id);
    await insertStudioEntry(tx, { person: ctx.person, studio }, 'studio.opened', { name });
    return studio;
  });
}
