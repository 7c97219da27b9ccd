import { z } from 'zod';
import { workspaceRoute } from '@/lib/http/route';
import { readUploadAgain } from '@/lib/review/read-upload-again';
import { UploadUnitInput } from '@/lib/review/schemas';

const params = z.object({ upload: z.string() });

export const POST = workspaceRoute({ params, body: UploadUnitInput }, ({ ctx, params: { upload }, body }) =>
  readUploadAgain(ctx, upload, body),
);
