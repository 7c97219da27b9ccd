import type { Metadata } from 'next';
import { currentPerson } from '@/lib/auth/session';
import { JoinView } from './join-view';

export const metadata: Metadata = { title: 'Invitation', referrer: 'no-referrer' };

export default async function JoinPage({ params }: { params: Promise<{ invitation: string }> }) {
  const [{ invitation }, person] = await Promise.all([params, currentPerson()]);
  return <JoinView token={invitation} person={person ? { name: person.name, email: person.email } : null} />;
}
