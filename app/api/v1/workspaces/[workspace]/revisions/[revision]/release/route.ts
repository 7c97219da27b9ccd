import { z } from 'zod';
import { json, workspaceRoute } from '@/lib/http/route';
import { releaseRevision } from '@/lib/production/release-revision';
import { ReleaseInput } from '@/lib/review/schemas';

export const POST = workspaceRoute(
  { params: z.object({ revision: z.string() }), body: ReleaseInput, idempotent: true },
  async ({ ctx, params, body }) => json(await releaseRevision(ctx, params.revision, body), 201),
);
