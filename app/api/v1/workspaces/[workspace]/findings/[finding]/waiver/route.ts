import { z } from 'zod';
import { json, workspaceRoute } from '@/lib/http/route';
import { WaiveInput } from '@/lib/review/schemas';
import { waiveFinding } from '@/lib/review/waive-finding';

const params = z.object({ finding: z.string() });

export const POST = workspaceRoute({ params, body: WaiveInput }, async ({ ctx, params: { finding }, body }) =>
  json(await waiveFinding(ctx, finding, body), 201),
);
