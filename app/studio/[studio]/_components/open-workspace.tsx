'use client';

import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { useForm } from 'react-hook-form';
import { api, ApiError, explainError } from '@/app/_components/api-client';
import { Button } from '@/app/_components/button';
import { Controlled } from '@/app/_components/controlled';
import { Dialog, DialogTrigger } from '@/app/_components/dialog';
import { FormProblem } from '@/app/_components/form-problem';
import { schemaResolver } from '@/app/_components/schema-resolver';
import { TextField } from '@/app/_components/text-field';

type Values = { name: string; code: string };

const createWorkspace = schemaResolver(
  async () => (await import('@/lib/workspaces/schemas')).CreateWorkspaceInput,
);

/** Opens a workspace for a client organisation, then leads to its people: somebody has to be invited next. */
export function OpenWorkspace({ studio }: { studio: string }) {
  const [isOpen, setOpen] = useState(false);
  return (
    <DialogTrigger isOpen={isOpen} onOpenChange={setOpen}>
      <Button variant="primary">Open a workspace</Button>
      <OpenWorkspaceDialog studio={studio} />
    </DialogTrigger>
  );
}

function OpenWorkspaceDialog({ studio }: { studio: string }) {
  const router = useRouter();
  const [problem, setProblem] = useState<string | null>(null);
  const { control, handleSubmit, formState, setError } = useForm<Values>({
    defaultValues: { name: '', code: '' },
    resolver: createWorkspace as never,
  });

  const open = handleSubmit(async (values) => {
    setProblem(null);
    try {
      const made = await api<{ slug: string }>(`/api/v1/studios/${studio}/workspaces`, {
        method: 'POST',
        body: values,
      });
      router.push(`/w/${made.slug}/people`);
    } catch (error) {
      if (error instanceof ApiError && error.reason === 'code-taken')
        setError('code', { message: error.detail });
      else setProblem(explainError(error).detail);
    }
  });

  return (
    <Dialog
      title="Open a workspace"
      isBusy={formState.isSubmitting}
      actions={(close) => (
        <>
          <Button onPress={close}>Cancel</Button>
          <Button variant="primary" isPending={formState.isSubmitting} onPress={() => void open()}>
            Open workspace
          </Button>
        </>
      )}
    >
      <form noValidate onSubmit={open} className="flex flex-col gap-4">
        <p className="text-sm text-slate">One for each client organisation. No client learns of another.</p>
        <Controlled control={control} name="name">
          {(field) => <TextField label="Client" help="The organisation’s name." autoFocus {...field} />}
        </Controlled>
        <Controlled control={control} name="code">
          {(field) => (
            <TextField
              label="Code"
              help="Two to four capitals. Template numbers begin with it, e.g. HBF-001."
              mono
              autoComplete="off"
              {...field}
              onChange={(text: string) => field.onChange(text.toUpperCase())}
            />
          )}
        </Controlled>
        <FormProblem>{problem}</FormProblem>
      </form>
    </Dialog>
  );
}
