import type { Metadata } from 'next';
import { PageHeader } from '@/app/_components/page-header';
import { DeskFrame } from '@/app/_frames/desk-frame';
import { enterDesk } from '@/app/_frames/enter-page';
import { OpenStudioForm } from './_components/open-studio-form';

export const metadata: Metadata = { title: 'Open a studio' };

/** Where somebody who makes templates begins. Clients never need this: they come by invitation. */
export default async function NewStudioPage() {
  const person = await enterDesk();
  return (
    <DeskFrame person={person} crumbs={[{ label: 'Open a studio' }]}>
      <PageHeader
        title="Open a studio"
        lead="You become its first lead. Clients do not need one: their studio invites them into a workspace."
      />
      <OpenStudioForm timeZone={person.timeZone} />
    </DeskFrame>
  );
}
