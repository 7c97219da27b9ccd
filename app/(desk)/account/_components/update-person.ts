import { api, explainError } from '../../../_components/api-client';

export interface PersonChange {
  name?: string;
  units?: 'mm' | 'in';
  /** IANA zone for times in mails. */
  timeZone?: string;
}

/** Changes the signed-in person; returns what went wrong, in words, or null. */
export async function updatePerson(change: PersonChange): Promise<string | null> {
  try {
    await api<unknown>('/api/v1/me', { method: 'PATCH', body: change });
    return null;
  } catch (error) {
    return explainError(error).detail;
  }
}
