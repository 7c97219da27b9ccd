import { z } from 'zod';
import { json, workspaceRoute } from '@/lib/http/route';
import { returnGate } from '@/lib/review/return-gate';
import { ReturnInput } from '@/lib/review/schemas';

const params = z.object({ gate: z.string() });

export const POST = workspaceRoute(
  { params, body: ReturnInput, idempotent: true },
  async ({ ctx, params: { gate }, body }) => json(await returnGate(ctx, gate, body), 201),
);
