import { noContent, workspaceRoute } from '@/lib/http/route';
import { endStandIn } from '@/lib/review/end-stand-in';
import { StandInParams } from '@/lib/review/stand-in-schemas';

export const DELETE = workspaceRoute({ params: StandInParams }, async ({ ctx, params }) => {
  await endStandIn(ctx, params.standIn);
  return noContent();
});
