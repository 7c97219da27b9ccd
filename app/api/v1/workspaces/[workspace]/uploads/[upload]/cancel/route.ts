import { z } from 'zod';
import { workspaceRoute } from '@/lib/http/route';
import { cancelUpload } from '@/lib/review/cancel-upload';

const params = z.object({ upload: z.string() });

export const POST = workspaceRoute({ params }, ({ ctx, params: { upload } }) => cancelUpload(ctx, upload));
