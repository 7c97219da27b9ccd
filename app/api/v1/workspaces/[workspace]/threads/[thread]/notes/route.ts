import { z } from 'zod';
import { json, workspaceRoute } from '@/lib/http/route';
import { replyToThread } from '@/lib/review/reply-to-thread';
import { NoteInput } from '@/lib/review/schemas';

const params = z.object({ thread: z.string() });

/** Repeats are known by the note's own client key, so no Idempotency-Key is asked for. */
export const POST = workspaceRoute({ params, body: NoteInput }, async ({ ctx, params: { thread }, body }) =>
  json(await replyToThread(ctx, thread, body), 201),
);
