import { z } from 'zod';
import { workspaceRoute } from '@/lib/http/route';
import { viewContent } from '@/lib/review/view-content';

const params = z.object({ revision: z.string() });

export const GET = workspaceRoute({ params }, ({ ctx, params: { revision } }) => viewContent(ctx, revision));
