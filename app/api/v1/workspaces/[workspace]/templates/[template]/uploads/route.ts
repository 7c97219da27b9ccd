import { z } from 'zod';
import { json, workspaceRoute } from '@/lib/http/route';
import { StartUploadInput } from '@/lib/review/schemas';
import { startUpload } from '@/lib/review/start-upload';

const params = z.object({ template: z.string() });

export const POST = workspaceRoute(
  { params, body: StartUploadInput },
  async ({ ctx, params: { template }, body }) => json(await startUpload(ctx, template, body), 201),
);
