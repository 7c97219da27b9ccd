import { z } from 'zod';
import { json, workspaceRoute } from '@/lib/http/route';
import { openPack } from '@/lib/production/open-pack';
import { rebuildPack } from '@/lib/production/rebuild-pack';

const params = z.object({ revision: z.string() });

/** Leads straight to the store: the pack's bytes never pass through this process. */
export const GET = workspaceRoute({ params }, async ({ ctx, params: { revision } }) => {
  const location = await openPack(ctx, revision);
  return new Response(null, {
    status: 307,
    headers: { location, 'cache-control': 'private, no-store', 'referrer-policy': 'no-referrer' },
  });
});

/** Orders a pack again whose building failed. */
export const POST = workspaceRoute({ params }, async ({ ctx, params: { revision } }) =>
  json(await rebuildPack(ctx, revision), 202),
);
