import { z } from 'zod';
import { workspaceRoute } from '@/lib/http/route';
import { viewDocket } from '@/lib/review/view-docket';

const params = z.object({ revision: z.string() });

export const GET = workspaceRoute({ params }, ({ ctx, params: { revision } }) => viewDocket(ctx, revision));
