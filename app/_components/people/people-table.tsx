import type { Role } from '@/lib/workspaces/role-names';
import type { PendingInvitationView, PersonView } from '@/lib/workspaces/schemas';
import { DataTable, type Column } from '../data-table';
import { SectionHead } from '../section-head';
import { StatusWord } from '../status-word';
import { Time } from '../time';
import { DeleteButton } from '../delete-button';
import { PersonActions } from './person-actions';
import { roleWords } from './role-words';

type PeopleProps = {
  caption: string;
  people: readonly PersonView[];
  /** Who reads. */
  readerId: string;
  /** What the reader may do to each person here; nothing where this is left out. */
  actions?: { apiPath: string; roles: readonly Role[]; place: string; mayChange: boolean };
};

/** People with role and address; a lead changes them here, everybody may leave by themselves. */
export function PeopleTable({ caption, people, readerId, actions }: PeopleProps) {
  const columns: Column<PersonView>[] = [
    {
      key: 'name',
      label: 'Name',
      isHead: true,
      cell: (person) => (
        <>
          <span className="font-semibold">{person.name}</span>
          {person.id === readerId ? <span className="text-slate"> (you)</span> : null}
        </>
      ),
    },
    {
      key: 'email',
      label: 'Address',
      cell: (person) => <span className="wrap-anywhere">{person.email}</span>,
    },
    { key: 'role', label: 'Role', cell: (person) => roleWords[person.role].label },
    { key: 'since', label: 'Since', cell: (person) => <Time at={person.since} show="day" /> },
  ];
  if (actions && (actions.mayChange || people.some((person) => person.id === readerId)))
    columns.push({
      key: 'actions',
      label: 'Change',
      align: 'end',
      cell: (person) =>
        actions.mayChange || person.id === readerId ? (
          <PersonActions
            apiPath={`${actions.apiPath}/people/${person.id}`}
            person={person}
            roles={actions.roles}
            place={actions.place}
            mayChange={actions.mayChange}
            isSelf={person.id === readerId}
          />
        ) : null,
    });
  return <DataTable caption={caption} columns={columns} rows={people} rowKey={(person) => person.id} />;
}

type InvitationProps = { invitations: readonly PendingInvitationView[]; apiPath: string };

/** Invitations that nobody has accepted yet. Renders nothing when there are none. */
export function OpenInvitations({ invitations, apiPath }: InvitationProps) {
  if (!invitations.length) return null;
  return (
    <section aria-labelledby="open-invitations" className="mt-8">
      <SectionHead id="open-invitations" title="Open invitations" count={invitations.length} />
      <DataTable
        caption="Open invitations"
        rows={invitations}
        rowKey={(invitation) => invitation.id}
        columns={[
          {
            key: 'email',
            label: 'Address',
            isHead: true,
            cell: (row) => <span className="wrap-anywhere">{row.email}</span>,
          },
          { key: 'role', label: 'Role', cell: (row) => roleWords[row.role].label },
          { key: 'by', label: 'Invited by', cell: (row) => row.invitedBy },
          {
            key: 'until',
            label: 'Works until',
            cell: (row) =>
              row.state === 'expired' ? (
                <StatusWord state="withdrawn" word="Ran out" />
              ) : (
                <Time at={row.expiresAt} show="both" />
              ),
          },
          {
            key: 'cancel',
            label: 'Change',
            align: 'end',
            cell: (row) => (
              <DeleteButton
                apiPath={`${apiPath}/invitations/${row.id}`}
                label={`Take back ${row.email}`}
                done={`The invitation of ${row.email} was taken back; its link no longer works.`}
              >
                Take back
              </DeleteButton>
            ),
          },
        ]}
      />
    </section>
  );
}
