import { z } from 'zod';
import { json, workspaceRoute } from '@/lib/http/route';
import { toStore } from '@/lib/http/to-store';
import { openPack } from '@/lib/production/open-pack';
import { rebuildPack } from '@/lib/production/rebuild-pack';

const params = z.object({ revision: z.string() });

export const GET = workspaceRoute({ params }, async ({ ctx, params: { revision } }) =>
  toStore(await openPack(ctx, revision)),
);

/** Orders a pack again whose building failed. */
export const POST = workspaceRoute({ params }, async ({ ctx, params: { revision } }) =>
  json(await rebuildPack(ctx, revision), 202),
);
