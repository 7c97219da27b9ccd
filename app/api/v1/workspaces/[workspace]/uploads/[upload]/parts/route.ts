import { z } from 'zod';
import { workspaceRoute } from '@/lib/http/route';
import { presignParts } from '@/lib/review/presign-parts';
import { PresignPartsInput } from '@/lib/review/schemas';

const params = z.object({ upload: z.string() });

export const POST = workspaceRoute({ params, body: PresignPartsInput }, ({ ctx, params: { upload }, body }) =>
  presignParts(ctx, upload, body),
);
