import { etagOf, versionOf } from '@/lib/http/if-match';
import { json, workspaceRoute } from '@/lib/http/route';
import { changeGatePlan } from '@/lib/workspaces/change-gate-plan';
import { ChangeGatePlanInput } from '@/lib/workspaces/gate-plan-schemas';
import { readGatePlan } from '@/lib/workspaces/read-gate-plan';

export const GET = workspaceRoute({}, async ({ ctx }) => {
  const plan = await readGatePlan(ctx);
  return json(plan, 200, { etag: etagOf(plan.number) });
});

export const PUT = workspaceRoute({ body: ChangeGatePlanInput }, async ({ ctx, body, request }) => {
  const plan = await changeGatePlan(ctx, versionOf(request), body);
  return json(plan, 200, { etag: etagOf(plan.number) });
});
