import { json, personRoute } from '@/lib/http/route';
import { openStudio } from '@/lib/studio/open-studio';
import { OpenStudioInput } from '@/lib/studio/schemas';

export const POST = personRoute({ body: OpenStudioInput }, async ({ ctx, body }) =>
  json(await openStudio(ctx, body), 201),
);
