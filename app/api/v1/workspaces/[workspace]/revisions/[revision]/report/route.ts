import { z } from 'zod';
import { json, workspaceRoute } from '@/lib/http/route';
import { readReport } from '@/lib/review/read-report';

const params = z.object({ revision: z.string() });

/** The engine's report as stored; its digest over the canonical JSON goes along as a header. */
export const GET = workspaceRoute({ params }, async ({ ctx, params: { revision } }) => {
  const { body, sha256 } = await readReport(ctx, revision);
  return json(body, 200, { 'x-report-sha256': sha256 });
});
