import { json, studioRoute } from '@/lib/http/route';
import { readJson } from '@/lib/http/read-input';
import { addLibraryItem } from '@/lib/studio/add-library-item';
import { ShelfParams } from '@/lib/studio/schemas';

export const POST = studioRoute({ params: ShelfParams }, async ({ ctx, params, request }) =>
  json(await addLibraryItem(ctx, params.kind, await readJson(request)), 201),
);
