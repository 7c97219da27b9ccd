import { authClient } from '../../../_components/auth-client';
import { askAuth } from '../../../_components/explain-auth';

export interface PersonChange {
  name?: string;
  units?: 'mm' | 'in';
  /** IANA zone for times in mails. */
  timeZone?: string;
}

/** Changes the signed-in person; returns what went wrong, in words, or null. */
export async function updatePerson(change: PersonChange): Promise<string | null> {
  // The client's types do not know our own fields of a person; the service checks them.
  const body = change as { name?: string };
  return (await askAuth(() => authClient.updateUser(body))).problem;
}
