import { api } from '../../../_components/api-client';
import { safePath } from '../../../_components/safe-path';
import { acceptedSchema } from './invitation';

/** Takes up an invitation; returns the path to go to. Throws `ApiError`. */
export async function acceptInvitation(
  token: string,
  idempotencyKey: string,
  person: { name: string; password: string; timeZone: string } | null,
): Promise<string> {
  const answer = await api<unknown>(`/api/v1/invitations/${encodeURIComponent(token)}/accept`, {
    method: 'POST',
    body: person ?? {},
    idempotencyKey,
  });
  return safePath(acceptedSchema.parse(answer).redirectTo);
}
