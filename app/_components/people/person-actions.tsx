'use client';

import { useRouter } from 'next/navigation';
import { useState } from 'react';
import type { Role } from '@/lib/workspaces/role-names';
import { api, explainError } from '../api-client';
import { Button } from '../button';
import { Dialog, DialogTrigger } from '../dialog';
import { FormProblem } from '../form-problem';
import { notify } from '../notices';
import { RadioGroup } from '../radio-group';
import { roleWords } from './role-words';

type Props = {
  /** Address of the person here, e.g. `/api/v1/workspaces/…/people/…`. */
  apiPath: string;
  person: { name: string; role: Role };
  roles: readonly Role[];
  place: string;
  mayChange: boolean;
  /** The reader themselves: the words are about leaving, and the way leads away. */
  isSelf: boolean;
};

/** Changes somebody's role or ends their membership. */
export function PersonActions({ apiPath, person, roles, place, mayChange, isSelf }: Props) {
  const router = useRouter();
  const [role, setRole] = useState<Role>(person.role);
  const [busy, setBusy] = useState(false);
  const [problem, setProblem] = useState<string | null>(null);

  async function run(close: () => void, work: () => Promise<unknown>, done: string, leaves = false) {
    setBusy(true);
    setProblem(null);
    try {
      await work();
      notify(done);
      close();
      if (leaves) router.replace('/today');
      router.refresh();
    } catch (error) {
      setProblem(explainError(error).detail);
    } finally {
      setBusy(false);
    }
  }
  const change = (close: () => void) =>
    run(
      close,
      () => api(apiPath, { method: 'PATCH', body: { role } }),
      `${person.name} is now ${roleWords[role].label.toLowerCase()}.`,
    );
  const remove = (close: () => void) =>
    run(
      close,
      () => api(apiPath, { method: 'DELETE' }),
      isSelf ? `You have left ${place}.` : `${person.name} no longer belongs to ${place}.`,
      isSelf,
    );

  return (
    <span className="flex flex-wrap justify-end gap-2">
      {mayChange ? (
        <DialogTrigger
          onOpenChange={() => {
            setProblem(null);
            setRole(person.role);
          }}
        >
          <Button size="small" aria-label={`Change the role of ${person.name}`}>
            Role
          </Button>
          <Dialog
            title={`Role of ${person.name}`}
            isBusy={busy}
            actions={(close) => (
              <>
                <Button onPress={close}>Cancel</Button>
                <Button
                  variant="primary"
                  isPending={busy}
                  isDisabled={role === person.role}
                  onPress={() => void change(close)}
                >
                  Change role
                </Button>
              </>
            )}
          >
            <div className="flex flex-col gap-4">
              <RadioGroup
                label={`Role at ${place}`}
                options={roles.map((value) => ({ value, ...roleWords[value] }))}
                value={role}
                onChange={(value) => setRole(value as Role)}
              />
              <FormProblem>{problem}</FormProblem>
            </div>
          </Dialog>
        </DialogTrigger>
      ) : null}
      <DialogTrigger onOpenChange={() => setProblem(null)}>
        <Button size="small" aria-label={isSelf ? `Leave ${place}` : `Remove ${person.name}`}>
          {isSelf ? 'Leave' : 'Remove'}
        </Button>
        <Dialog
          title={isSelf ? `Leave ${place}?` : `Remove ${person.name}?`}
          role="alertdialog"
          size="narrow"
          isBusy={busy}
          actions={(close) => (
            <>
              <Button onPress={close}>Cancel</Button>
              <Button variant="danger" isPending={busy} onPress={() => void remove(close)}>
                {isSelf ? 'Leave' : 'Remove'}
              </Button>
            </>
          )}
        >
          <div className="flex flex-col gap-3">
            <p>
              {isSelf ? 'You lose' : `${person.name} loses`} sight of {place} at once. What was signed and
              written stays, with its name. Coming back needs a new invitation.
            </p>
            <FormProblem>{problem}</FormProblem>
          </div>
        </Dialog>
      </DialogTrigger>
    </span>
  );
}
