import type { Metadata } from 'next';
import { DeskFrame } from '@/app/_frames/desk-frame';
import { enterDesk } from '@/app/_frames/enter-page';
import { spacesOf } from '@/app/_frames/spaces';
import { readSecondFactor } from '@/lib/auth/second-factor-data';
import { PageHeader } from '../../_components/page-header';
import { AccountSection } from './_components/account-section';
import { Memberships } from './_components/memberships';
import { NameForm } from './_components/name-form';
import { PasswordForm } from './_components/password-form';
import { ReadingSettings } from './_components/reading-settings';
import { SecondFactor } from './_components/second-factor';
import { SessionList } from './_components/session-list';

export const metadata: Metadata = { title: 'Account' };

export default async function AccountPage() {
  const person = await enterDesk();
  const [spaces, factor] = await Promise.all([spacesOf(person.id, ''), readSecondFactor(person.id)]);
  return (
    <DeskFrame person={person} crumbs={[{ label: 'Account' }]}>
      <PageHeader title="Account" lead="What is yours everywhere, in every studio and workspace." />
      <div className="flex flex-col gap-9">
        <AccountSection
          title="You"
          lead="Your name stands beside everything you write and sign from now on. What is signed already keeps the name it was signed with."
        >
          <NameForm name={person.name} email={person.email} />
        </AccountSection>
        <AccountSection
          title="Reading"
          lead="How figures, times and colours are shown to you. What is stored stays in millimetres and universal time."
        >
          <ReadingSettings mailZone={person.timeZone} />
        </AccountSection>
        <AccountSection title="Password" lead="Setting a new one ends your sessions on all other devices.">
          <PasswordForm email={person.email} />
        </AccountSection>
        <AccountSection
          title="Second factor"
          lead="Something that you have, besides the password that you know."
        >
          <SecondFactor email={person.email} on={factor.on} codesLeft={factor.codesLeft} />
        </AccountSection>
        <AccountSection
          title="Sessions"
          lead="Where you are signed in. End what you do not know, then set a new password."
        >
          <SessionList />
        </AccountSection>
        <AccountSection
          title="Where you belong"
          lead="To leave, or to have another role, ask a lead of the studio."
        >
          <Memberships spaces={spaces} />
        </AccountSection>
      </div>
    </DeskFrame>
  );
}
