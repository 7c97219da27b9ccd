'use client';

import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { useForm } from 'react-hook-form';
import type { Role } from '@/lib/workspaces/role-names';
import { api, explainError } from '../api-client';
import { Button } from '../button';
import { Controlled } from '../controlled';
import { Dialog, DialogTrigger } from '../dialog';
import { FormProblem } from '../form-problem';
import { notify } from '../notices';
import { RadioGroup } from '../radio-group';
import { schemaResolver } from '../schema-resolver';
import { TextField } from '../text-field';
import { roleWords } from './role-words';

type Values = { email: string; role: Role };
type Props = {
  /** Address of the invitations, e.g. `/api/v1/studios/…/invitations`. */
  apiPath: string;
  side: 'studio' | 'client';
  roles: readonly Role[];
  place: string;
};

const schemas = () => import('@/lib/workspaces/schemas');
const inviteClient = schemaResolver(async () => (await schemas()).InviteClientInput);
const inviteStaff = schemaResolver(async () => (await schemas()).InviteStaffInput);

/** Invites somebody by mail, in one of the roles of a side. */
export function InvitePerson({ apiPath, side, roles, place }: Props) {
  const [isOpen, setOpen] = useState(false);
  return (
    <DialogTrigger isOpen={isOpen} onOpenChange={setOpen}>
      <Button variant="primary">Invite {side === 'client' ? 'a client' : 'staff'}</Button>
      <InviteDialog apiPath={apiPath} side={side} roles={roles} place={place} close={() => setOpen(false)} />
    </DialogTrigger>
  );
}

function InviteDialog({ apiPath, side, roles, place, close }: Props & { close: () => void }) {
  const router = useRouter();
  const [problem, setProblem] = useState<string | null>(null);
  const { control, handleSubmit, formState } = useForm<Values>({
    defaultValues: { email: '', role: roles.at(-1) },
    resolver: (side === 'client' ? inviteClient : inviteStaff) as never,
  });

  const send = handleSubmit(async (values) => {
    setProblem(null);
    try {
      await api(apiPath, { method: 'POST', body: values });
      notify(`An invitation is on its way to ${values.email}.`);
      close();
      router.refresh();
    } catch (error) {
      setProblem(explainError(error).detail);
    }
  });

  return (
    <Dialog
      title={`Invite to ${place}`}
      isBusy={formState.isSubmitting}
      actions={(cancel) => (
        <>
          <Button onPress={cancel}>Cancel</Button>
          <Button variant="primary" isPending={formState.isSubmitting} onPress={() => void send()}>
            Send invitation
          </Button>
        </>
      )}
    >
      <form noValidate onSubmit={send} className="flex flex-col gap-4">
        <p className="text-sm text-slate">
          A mail brings a link that works once, for seven days, for this address only.
        </p>
        <Controlled control={control} name="email">
          {(field) => <TextField label="Address" type="email" autoComplete="off" autoFocus {...field} />}
        </Controlled>
        <Controlled control={control} name="role">
          {(field) => (
            <RadioGroup
              label="Role"
              options={roles.map((role) => ({ value: role, ...roleWords[role] }))}
              {...field}
            />
          )}
        </Controlled>
        <FormProblem>{problem}</FormProblem>
      </form>
    </Dialog>
  );
}
