import { z } from 'zod';
import { workspaceRoute } from '@/lib/http/route';
import { discardDraft } from '@/lib/review/discard-draft';
import { openDraft } from '@/lib/review/open-draft';
import { saveDraft } from '@/lib/review/save-draft';
import { SaveDraftInput } from '@/lib/review/schemas';

const params = z.object({ template: z.string() });

/** Makes the draft where there is none yet: it is the reader's own working paper. */
export const GET = workspaceRoute({ params }, ({ ctx, params: { template } }) => openDraft(ctx, template));

export const PUT = workspaceRoute({ params, body: SaveDraftInput }, ({ ctx, params: { template }, body }) =>
  saveDraft(ctx, template, body),
);

export const DELETE = workspaceRoute({ params }, ({ ctx, params: { template } }) =>
  discardDraft(ctx, template),
);
