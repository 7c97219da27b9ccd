import { api, explainError } from '../../../_components/api-client';
import type { UpdateMeInput } from '@/lib/workspaces/schemas';

/** Changes the signed-in person; returns what went wrong, in words, or null. */
export async function updatePerson(change: UpdateMeInput): Promise<string | null> {
  try {
    await api<unknown>('/api/v1/me', { method: 'PATCH', body: change });
    return null;
  } catch (error) {
    return explainError(error).detail;
  }
}
