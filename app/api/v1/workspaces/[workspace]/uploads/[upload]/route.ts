import { z } from 'zod';
import { workspaceRoute } from '@/lib/http/route';
import { viewUpload } from '@/lib/review/view-upload';

const params = z.object({ upload: z.string() });

export const GET = workspaceRoute({ params }, ({ ctx, params: { upload } }) => viewUpload(ctx, upload));
