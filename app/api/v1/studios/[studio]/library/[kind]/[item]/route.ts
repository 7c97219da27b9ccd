import { etagOf, versionOf } from '@/lib/http/if-match';
import { readJson } from '@/lib/http/read-input';
import { json, noContent, studioRoute } from '@/lib/http/route';
import { changeLibraryItem } from '@/lib/studio/change-library-item';
import { removeLibraryItem } from '@/lib/studio/remove-library-item';
import { ItemParams } from '@/lib/studio/schemas';

export const PATCH = studioRoute({ params: ItemParams }, async ({ ctx, params, request }) => {
  const version = versionOf(request);
  const item = await changeLibraryItem(ctx, params.kind, params.item, version, await readJson(request));
  return json(item, 200, { etag: etagOf(item.version) });
});
export const DELETE = studioRoute({ params: ItemParams }, async ({ ctx, params, request }) => {
  await removeLibraryItem(ctx, params.kind, params.item, versionOf(request));
  return noContent();
});
