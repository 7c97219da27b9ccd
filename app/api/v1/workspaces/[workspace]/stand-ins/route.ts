import { json, workspaceRoute } from '@/lib/http/route';
import { listStandIns } from '@/lib/review/list-stand-ins';
import { nameStandIn } from '@/lib/review/name-stand-in';
import { NameStandInInput } from '@/lib/review/stand-in-schemas';

export const GET = workspaceRoute({}, async ({ ctx }) => listStandIns(ctx));

export const POST = workspaceRoute({ body: NameStandInInput }, async ({ ctx, body }) =>
  json(await nameStandIn(ctx, body), 201),
);
