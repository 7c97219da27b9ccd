'use client';

import { useQuery } from '@tanstack/react-query';
import { api, explainError } from '../../../_components/api-client';
import { Button } from '../../../_components/button';
import { ErrorState } from '../../../_components/error-state';
import { ButtonLink } from '../../../_components/link';
import { notify } from '../../../_components/notices';
import { signOut } from '../../../_components/sign-out';
import { Skeleton } from '../../../_components/skeleton';
import { Time } from '../../../_components/time';
import { useNow } from '../../../_components/use-now';
import { NarrowPage } from '../../_components/narrow-page';
import { JoinAsMember } from './join-as-member';
import { JoinAsNewPerson } from './join-as-new-person';
import { closedBecause, invitationSchema, roleInWords } from './invitation';

interface Reader {
  name: string;
  email: string;
}

export function JoinView({ token, person }: { token: string; person: Reader | null }) {
  const now = useNow();
  const { data, error } = useQuery({
    queryKey: ['invitation', token],
    queryFn: async ({ signal }) =>
      invitationSchema.parse(
        await api<unknown>(`/api/v1/invitations/${encodeURIComponent(token)}`, { signal }),
      ),
  });

  if (error) {
    const { title, detail, reference } = explainError(error);
    return (
      <ErrorState level={1} title={`The invitation could not be opened: ${title}`} reference={reference}>
        {detail} If the link in the mail was cut short, copy all of it into the address bar, or ask for a new
        invitation.
      </ErrorState>
    );
  }
  if (!data) {
    return (
      <NarrowPage title="Invitation">
        <Skeleton lines={5} label="Loading the invitation" />
      </NarrowPage>
    );
  }

  const place = data.workspaceName ?? data.studioName;
  const closed = closedBecause(data, now);
  if (closed) {
    return (
      <NarrowPage title={`This invitation to ${place} is closed`} lead={closed}>
        <p className="mb-4">To come in, ask the person who invited you for a new one.</p>
        <ButtonLink href={person ? '/today' : '/sign-in'}>{person ? 'Go to Today' : 'Sign in'}</ButtonLink>
      </NarrowPage>
    );
  }

  const lead = (
    <p>
      {data.workspaceName
        ? `${data.studioName} invites you to its workspace for ${data.workspaceName}`
        : `${data.studioName} invites you`}{' '}
      as <strong className="text-ink">{data.role}</strong>: you may {roleInWords(data.role)}. Open until{' '}
      <Time at={data.expiresAt} show="moment" />.
    </p>
  );
  return (
    <NarrowPage title={`Join ${place}`} lead={lead}>
      {person === null && data.hasAccount ? <SignInToJoin token={token} email={data.email} /> : null}
      {person === null && !data.hasAccount ? <JoinAsNewPerson token={token} email={data.email} /> : null}
      {person && sameAddress(person.email, data.email) ? (
        <JoinAsMember token={token} name={person.name} place={place} />
      ) : null}
      {person && !sameAddress(person.email, data.email) ? (
        <OtherPerson signedInAs={person.email} invited={data.email} />
      ) : null}
    </NarrowPage>
  );
}

function sameAddress(a: string, b: string): boolean {
  return a.trim().toLowerCase() === b.trim().toLowerCase();
}

function SignInToJoin({ token, email }: { token: string; email: string }) {
  const here = `/join/${encodeURIComponent(token)}`;
  return (
    <div className="flex flex-col items-start gap-4">
      <p>
        <strong>{email}</strong> has been here before. Sign in, and the invitation is added to what you have.
      </p>
      <ButtonLink
        href={`/sign-in?email=${encodeURIComponent(email)}&next=${encodeURIComponent(here)}`}
        variant="primary"
        size="roomy"
      >
        Sign in and join
      </ButtonLink>
    </div>
  );
}

function OtherPerson({ signedInAs, invited }: { signedInAs: string; invited: string }) {
  return (
    <div className="flex flex-col items-start gap-4">
      <p>
        The invitation is for <strong>{invited}</strong>, and you are signed in as{' '}
        <strong>{signedInAs}</strong>. Sign out, then open the link again.
      </p>
      <Button
        onPress={() =>
          signOut().catch(() =>
            notify('You are still signed in: the server did not answer. Try again.', { kind: 'trouble' }),
          )
        }
      >
        Sign out
      </Button>
    </div>
  );
}
