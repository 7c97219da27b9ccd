'use client';

import { useRouter } from 'next/navigation';
import { useCallback, useEffect, useRef, useState } from 'react';
import { useForm, type FieldValues } from 'react-hook-form';
import { api, ApiError, explainError, fieldName, newIdempotencyKey } from '@/app/_components/api-client';
import { Button } from '@/app/_components/button';
import { Caution } from '@/app/_components/caution';
import { notify } from '@/app/_components/notices';
import { SectionHead } from '@/app/_components/section-head';
import { TextArea } from '@/app/_components/text-field';
import type { DraftView as DraftViewSchema } from '@/lib/review/schemas';
import type { z } from 'zod';
import { useDraft } from '../_hooks/use-draft';
import { useUpload } from '../_hooks/use-upload';
import { DiscardDraft } from './discard-draft';
import { DraftClash } from './draft-clash';
import { FilePanel } from './file-panel';
import { libraryPresets, type Library } from './library-presets';
import { RecipeForm } from './recipe-form';
import { recipeResolver } from './recipe-resolver';
import { SaveLine } from './save-line';

type DraftView = z.infer<typeof DraftViewSchema>;
type Props = {
  apiPath: string;
  roomPath: string;
  readerId: string;
  draft: DraftView;
  library: Library | null;
};

/** Where a designer posts: the file on one side, the recipe on the other, one button that freezes both. */
export function PostDesk({ apiPath, roomPath, readerId, draft, library }: Props) {
  const router = useRouter();
  const templatePath = `${apiPath}/templates/${draft.templateId}`;
  const { state, change, save, keepMine, forget, tell, version } = useDraft(`${templatePath}/draft`, {
    uploadId: draft.upload?.id ?? null,
    recipe: draft.recipe,
    note: draft.note,
    version: draft.version,
  });
  const [note, setNote] = useState(draft.note);
  const [posting, setPosting] = useState(false);
  const [trouble, setTrouble] = useState<string | null>(null);
  const postKey = useRef(newIdempotencyKey());
  const form = useForm<FieldValues>({
    defaultValues: draft.recipe,
    resolver: recipeResolver,
    mode: 'onBlur',
  });
  const { watch, setValue, getValues, control, trigger, setError, formState } = form;

  useEffect(() => {
    const subscription = watch((values) => change({ recipe: structuredClone(values) }));
    return () => subscription.unsubscribe();
  }, [change, watch]);

  const upload = useUpload(
    apiPath,
    draft.templateId,
    draft.upload,
    useCallback((next) => change({ uploadId: next?.id ?? null }), [change]),
  );
  const ready = upload.sending.phase === 'ready';

  async function post() {
    setTrouble(null);
    if (!(await trigger())) {
      setTrouble('Some fields of the recipe are not right. They are marked above.');
      return;
    }
    setPosting(true);
    try {
      await save();
      const { letter } = await api<{ letter: string }>(`${templatePath}/revisions`, {
        body: { version: version.current },
        idempotencyKey: postKey.current,
      });
      notify(`Revision ${letter} is posted.`, { kind: 'done' });
      router.push(`${roomPath}/${letter}`);
    } catch (error) {
      postKey.current = newIdempotencyKey();
      setPosting(false);
      if (await tell(error)) return;
      setTrouble(explainError(error).detail);
      if (error instanceof ApiError)
        for (const { pointer, detail } of error.errors)
          setError(fieldName(pointer).replace(/^recipe\./, ''), { message: detail });
    }
  }

  return (
    <div className="flex flex-col gap-6">
      <DraftClash
        state={state}
        readerId={readerId}
        templatePath={roomPath}
        onTheirs={() => {
          forget();
          window.location.reload();
        }}
        onMine={() =>
          void keepMine().then(
            () => router.refresh(),
            () => undefined,
          )
        }
      />
      <div className="grid grid-cols-1 gap-x-10 gap-y-8 lg:grid-cols-[minmax(18rem,2fr)_5fr]">
        <div className="flex flex-col gap-6 lg:sticky lg:top-4 lg:self-start">
          <section aria-labelledby="post-file">
            <SectionHead title="Mesh" id="post-file" />
            <div className="mt-3">
              <FilePanel
                {...upload}
                unit={String(getValues('mesh.unit') ?? 'mm')}
                onUnit={(unit) => setValue('mesh.unit', unit, { shouldDirty: true })}
              />
            </div>
          </section>
          <TextArea
            label="What to look at"
            help="Goes to everyone with the revision: what is new, what you would like them to check."
            rows={4}
            value={note}
            onChange={(text) => {
              setNote(text);
              change({ note: text });
            }}
            optional
          />
          <section aria-label="Post" className="flex flex-col gap-3 border-t border-ink pt-4">
            <p className="text-sm text-slate">
              Posting freezes mesh and recipe as revision {draft.nextLetter}. A change after that is a new
              revision.
            </p>
            <Button
              variant="primary"
              size="roomy"
              isDisabled={!ready}
              isPending={posting}
              onPress={() => void post()}
            >
              Post revision {draft.nextLetter}
            </Button>
            {!ready ? (
              <p className="text-sm text-slate">A mesh that was read without fault is needed first.</p>
            ) : null}
            {trouble ? (
              <p role="alert" className="text-sm font-medium text-madder">
                {trouble}
              </p>
            ) : null}
            <SaveLine state={state} marked={Object.keys(formState.errors).length > 0 || trouble !== null} />
            <DiscardDraft
              apiPath={`${templatePath}/draft`}
              templatePath={roomPath}
              letter={draft.nextLetter}
              onDiscarded={() => {
                forget();
                upload.pause();
              }}
            />
          </section>
        </div>
        <div className="flex flex-col gap-8">
          <RecipeForm
            control={control}
            presets={library ? libraryPresets({ library, setValue }) : undefined}
          />
          <Caution title="Hot work">
            Temperatures, pressures and lives given here are estimates, to be proven by a test pull. Follow
            the machine’s and the materials’ documents and local codes: hot sheet and tools, compressed air,
            fumes.
          </Caution>
        </div>
      </div>
    </div>
  );
}
