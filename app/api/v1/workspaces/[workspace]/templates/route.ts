import { json, workspaceRoute } from '@/lib/http/route';
import { createTemplate } from '@/lib/review/create-template';
import { listTemplates } from '@/lib/review/list-templates';
import { CreateTemplateInput, ListTemplatesInput } from '@/lib/review/schemas';

export const GET = workspaceRoute({ query: ListTemplatesInput }, ({ ctx, query }) =>
  listTemplates(ctx, query),
);

export const POST = workspaceRoute({ body: CreateTemplateInput, idempotent: true }, async ({ ctx, body }) =>
  json(await createTemplate(ctx, body), 201),
);
