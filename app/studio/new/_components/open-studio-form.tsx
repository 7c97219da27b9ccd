'use client';

import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { useForm } from 'react-hook-form';
import { api, explainError } from '@/app/_components/api-client';
import { Button } from '@/app/_components/button';
import { Controlled } from '@/app/_components/controlled';
import { FormProblem } from '@/app/_components/form-problem';
import { schemaResolver } from '@/app/_components/schema-resolver';
import { TextField } from '@/app/_components/text-field';

type Values = { name: string; timeZone: string };

const openStudio = schemaResolver(async () => (await import('@/lib/studio/schemas')).OpenStudioInput);

export function OpenStudioForm({ timeZone }: { timeZone: string }) {
  const router = useRouter();
  const [problem, setProblem] = useState<string | null>(null);
  const { control, handleSubmit, formState } = useForm<Values>({
    defaultValues: { name: '', timeZone },
    resolver: openStudio as never,
  });

  const open = handleSubmit(async (values) => {
    setProblem(null);
    try {
      const made = await api<{ slug: string }>('/api/v1/studios', { method: 'POST', body: values });
      router.push(`/studio/${made.slug}`);
      router.refresh();
    } catch (error) {
      setProblem(explainError(error).detail);
    }
  });

  return (
    <form noValidate onSubmit={open} className="flex max-w-md flex-col gap-4">
      <Controlled control={control} name="name">
        {(field) => <TextField label="Studio" help="Its name, as clients know it." {...field} />}
      </Controlled>
      <Controlled control={control} name="timeZone">
        {(field) => <TextField label="Time zone" help="For its dates, e.g. Europe/Lisbon." {...field} />}
      </Controlled>
      <FormProblem>{problem}</FormProblem>
      <Button type="submit" variant="primary" isPending={formState.isSubmitting} className="self-start">
        Open studio
      </Button>
    </form>
  );
}
