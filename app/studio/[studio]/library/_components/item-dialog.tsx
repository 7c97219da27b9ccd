'use client';

import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { useForm } from 'react-hook-form';
import { api, ApiError, explainError, fieldName } from '@/app/_components/api-client';
import { Button } from '@/app/_components/button';
import { Checkbox } from '@/app/_components/checkbox';
import { Controlled } from '@/app/_components/controlled';
import { Dialog, DialogTrigger } from '@/app/_components/dialog';
import { FormProblem } from '@/app/_components/form-problem';
import { notify } from '@/app/_components/notices';
import { NumberField } from '@/app/_components/number-field';
import { schemaResolver } from '@/app/_components/schema-resolver';
import { Select } from '@/app/_components/select';
import { TextField } from '@/app/_components/text-field';
import type { LibraryItem, LibraryKind } from '@/lib/studio/schemas';
import { shelfFields, shelfWords, type ShelfField } from './shelf-fields';

type Values = Record<string, string | number | boolean | null>;
type Props = {
  /** Address of the shelf, e.g. `/api/v1/studios/…/library/sheets`. */
  apiPath: string;
  kind: LibraryKind;
  /** Left out to add one. */
  item?: LibraryItem;
};

const shelf = (kind: LibraryKind) =>
  schemaResolver(async () => (await import('@/lib/studio/schemas')).libraryInputs[kind]);
const resolvers: Record<LibraryKind, ReturnType<typeof schemaResolver>> = {
  machines: shelf('machines'),
  printers: shelf('printers'),
  sheets: shelf('sheets'),
  filaments: shelf('filaments'),
};

/** Adds an item to a shelf, or changes one. */
export function ItemDialog(props: Props) {
  const [isOpen, setOpen] = useState(false);
  const { kind, item } = props;
  return (
    <DialogTrigger isOpen={isOpen} onOpenChange={setOpen}>
      {item ? (
        <Button size="small" aria-label={`Change ${item.name}`}>
          Change
        </Button>
      ) : (
        <Button size="small">Add a {shelfWords[kind].one}</Button>
      )}
      <ItemForm {...props} close={() => setOpen(false)} />
    </DialogTrigger>
  );
}

function valuesOf(kind: LibraryKind, item: LibraryItem | undefined): Values {
  const given = item as unknown as Values | undefined;
  const fields = shelfFields[kind].map((field): [string, Values[string]] => [
    field.name,
    given?.[field.name] ?? (field.options ? field.options[0].value : field.name === 'name' ? '' : null),
  ]);
  return { ...Object.fromEntries(fields), isDefault: given?.isDefault ?? false };
}

function ItemForm({ apiPath, kind, item, close }: Props & { close: () => void }) {
  const router = useRouter();
  const [problem, setProblem] = useState<string | null>(null);
  const { control, handleSubmit, formState, setError } = useForm<Values>({
    defaultValues: valuesOf(kind, item),
    resolver: resolvers[kind] as never,
  });

  const save = handleSubmit(async (values) => {
    setProblem(null);
    try {
      if (item)
        await api(`${apiPath}/${item.id}`, { method: 'PATCH', body: values, ifMatch: `"${item.version}"` });
      else await api(apiPath, { method: 'POST', body: values });
      notify(item ? `${values.name} was changed.` : `${values.name} was added.`);
      close();
      router.refresh();
    } catch (error) {
      if (error instanceof ApiError) {
        for (const { pointer, detail } of error.errors) setError(fieldName(pointer), { message: detail });
        if (error.reason === 'name-taken') return setError('name', { message: error.detail });
      }
      setProblem(explainError(error).detail);
    }
  });

  return (
    <Dialog
      title={item ? `Change ${item.name}` : `Add a ${shelfWords[kind].one}`}
      isBusy={formState.isSubmitting}
      actions={(cancel) => (
        <>
          <Button onPress={cancel}>Cancel</Button>
          <Button variant="primary" isPending={formState.isSubmitting} onPress={() => void save()}>
            {item ? 'Save' : 'Add'}
          </Button>
        </>
      )}
    >
      <form noValidate onSubmit={save} className="grid gap-4 sm:grid-cols-2">
        {shelfFields[kind].map((field) => (
          <div key={field.name} className={field.unit ? undefined : 'sm:col-span-2'}>
            <Controlled control={control} name={field.name}>
              {(tied) => <FieldOf field={field} tied={tied as never} />}
            </Controlled>
          </div>
        ))}
        <div className="sm:col-span-2">
          <Controlled control={control} name="isDefault">
            {(tied) => (
              <Checkbox
                label="Suggest this one first in a new recipe"
                {...tied}
                value={Boolean(tied.value)}
              />
            )}
          </Controlled>
        </div>
        <div className="sm:col-span-2">
          <FormProblem>{problem}</FormProblem>
        </div>
      </form>
    </Dialog>
  );
}

type Tied = { value: never; onChange: (value: unknown) => void; onBlur: () => void; error?: string };

function FieldOf({ field, tied }: { field: ShelfField; tied: Tied }) {
  if (field.options)
    return <Select label={field.label} help={field.help} options={field.options} {...tied} />;
  if (field.unit)
    return (
      <NumberField label={field.label} help={field.help} unit={field.unit} step={field.step} {...tied} />
    );
  return <TextField label={field.label} help={field.help} {...tied} />;
}
