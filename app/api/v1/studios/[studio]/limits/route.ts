import { etagOf, versionOf } from '@/lib/http/if-match';
import { json, studioRoute } from '@/lib/http/route';
import { SetLimitsInput } from '@/lib/studio/schemas';
import { setLimits } from '@/lib/studio/set-limits';

export const PUT = studioRoute({ body: SetLimitsInput }, async ({ ctx, body, request }) => {
  const limits = await setLimits(ctx, versionOf(request), body);
  return json(limits, 200, { etag: etagOf(limits.version) });
});
