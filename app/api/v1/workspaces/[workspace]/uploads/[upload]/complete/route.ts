import { z } from 'zod';
import { workspaceRoute } from '@/lib/http/route';
import { completeUpload } from '@/lib/review/complete-upload';

const params = z.object({ upload: z.string() });

export const POST = workspaceRoute({ params }, ({ ctx, params: { upload } }) => completeUpload(ctx, upload));
