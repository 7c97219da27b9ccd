import { z } from 'zod';
import { json, workspaceRoute } from '@/lib/http/route';
import { SignInput } from '@/lib/review/schemas';
import { signGate } from '@/lib/review/sign-gate';

const params = z.object({ gate: z.string() });

export const POST = workspaceRoute(
  { params, body: SignInput, idempotent: true },
  async ({ ctx, params: { gate }, body }) => json(await signGate(ctx, gate, body), 201),
);
