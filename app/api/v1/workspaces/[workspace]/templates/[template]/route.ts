import { z } from 'zod';
import { workspaceRoute } from '@/lib/http/route';
import { changeTemplate } from '@/lib/review/change-template';
import { ChangeTemplateInput } from '@/lib/review/schemas';
import { viewTemplate } from '@/lib/review/view-template';

const params = z.object({ template: z.string() });

export const GET = workspaceRoute({ params }, ({ ctx, params: { template } }) => viewTemplate(ctx, template));

export const PATCH = workspaceRoute(
  { params, body: ChangeTemplateInput },
  ({ ctx, params: { template }, body }) => changeTemplate(ctx, template, body),
);
