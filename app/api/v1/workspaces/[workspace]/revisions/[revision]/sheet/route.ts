import { z } from 'zod';
import { workspaceRoute } from '@/lib/http/route';
import { locateFile } from '@/lib/review/locate-file';
import { toStore } from '@/lib/http/to-store';

const params = z.object({ revision: z.string() });

export const GET = workspaceRoute({ params }, async ({ ctx, params: { revision } }) =>
  toStore(await locateFile(ctx, revision, 'sheet')),
);
