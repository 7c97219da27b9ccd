import { z } from 'zod';
import { workspaceRoute } from '@/lib/http/route';
import { viewRevision } from '@/lib/review/view-revision';

const params = z.object({ revision: z.string() });

export const GET = workspaceRoute({ params }, ({ ctx, params: { revision } }) => viewRevision(ctx, revision));
