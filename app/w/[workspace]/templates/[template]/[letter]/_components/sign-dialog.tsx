'use client';

import { useEffect, useRef, useState } from 'react';
import { ApiError, explainError, newIdempotencyKey } from '@/app/_components/api-client';
import { Button } from '@/app/_components/button';
import { Dialog } from '@/app/_components/dialog';
import { ErrorState } from '@/app/_components/error-state';
import { notify } from '@/app/_components/notices';
import { PasswordField } from '@/app/_components/password-field';
import { Skeleton } from '@/app/_components/skeleton';
import { TextArea } from '@/app/_components/text-field';
import { ReturnInput, SignInput, type ContentView, type RevisionView } from '@/lib/review/schemas';
import { useSignOff } from '../_hooks/use-room-commands';
import { useContent } from '../_hooks/use-room-data';
import { contentChanges } from './content-changes';
import { ContentSummary } from './content-summary';
import { useRoom } from './room-context';

type Gate = NonNullable<RevisionView['can']['sign']>;

export interface SignDialogProps {
  gate: Gate;
  /** `sign` puts the name to it, `return` sends it back with a reason. */
  decision: 'sign' | 'return';
  isOpen: boolean;
  onOpenChange: (isOpen: boolean) => void;
}

/** Signs for a gate, or returns the revision at it: shows what is signed, asks the password, says what it means. */
export function SignDialog({ gate, decision, isOpen, onOpenChange }: SignDialogProps) {
  const { workspace, revision, reader } = useRoom();
  const signOff = useSignOff(workspace.id, revision.id);
  const title =
    decision === 'sign'
      ? `Sign for the ${gate.gateName.toLowerCase()}`
      : `Return revision ${revision.letter} of ${revision.template.number}`;
  const form = useSignForm({ gate, decision, isOpen, signOff, onDone: () => onOpenChange(false) });
  const { content, problem, errors } = form;
  return (
    <Dialog
      title={title}
      size="wide"
      isOpen={isOpen}
      onOpenChange={onOpenChange}
      isBusy={signOff.isPending}
      actions={(close) => (
        <>
          <Button size="roomy" onPress={close} isDisabled={signOff.isPending}>
            Cancel
          </Button>
          <Button
            size="roomy"
            variant={decision === 'sign' ? 'primary' : 'danger'}
            isPending={signOff.isPending}
            isDisabled={!content}
            onPress={form.submit}
          >
            {decision === 'sign' ? `Sign as ${reader.name}` : 'Return it'}
          </Button>
        </>
      )}
    >
      <div className="flex flex-col gap-5">
        {form.changes.length > 0 ? (
          <div role="alert" className="border-l-4 border-ochre bg-ochre-wash px-4 py-3">
            <p className="font-semibold">
              What would be signed has changed since it was shown to you. Nothing was signed.
            </p>
            <ul className="list-disc pl-5">
              {form.changes.map((change) => (
                <li key={change}>{change}</li>
              ))}
            </ul>
            <p>Read it again below, then decide.</p>
          </div>
        ) : null}
        <section aria-label="What is signed">
          {content ? (
            <ContentSummary content={content} />
          ) : form.loadError ? (
            <ErrorState
              title="What would be signed could not be loaded"
              level={3}
              actions={<Button onPress={form.reload}>Try again</Button>}
            >
              {explainError(form.loadError).detail}
            </ErrorState>
          ) : (
            <Skeleton lines={9} label="What would be signed is on its way" />
          )}
        </section>
        <form
          ref={form.element}
          className="flex flex-col gap-4"
          onSubmit={(event) => {
            event.preventDefault();
            form.submit();
          }}
        >
          {decision === 'return' ? (
            <TextArea
              label="What must change"
              help="It closes this revision; the studio answers with the next one. The reason stays on record."
              value={form.reason}
              onChange={form.setReason}
              error={errors.reason}
              isRequired
              maxLength={2000}
            />
          ) : null}
          <p>
            {decision === 'sign' ? (
              <>
                By signing I, <strong className="font-semibold">{reader.name}</strong>, {reader.role}, state:{' '}
                <strong className="font-semibold">{gate.meaning}</strong>
              </>
            ) : (
              <>
                I, <strong className="font-semibold">{reader.name}</strong>, {reader.role}, return this
                revision at the {gate.gateName.toLowerCase()} gate.
              </>
            )}
          </p>
          <PasswordField
            label="Your password"
            autoComplete="current-password"
            value={form.password}
            onChange={form.setPassword}
            error={errors.password}
            isRequired
            roomy
          />
          {problem ? (
            <p role="alert" className="border-l-4 border-madder bg-madder-wash px-4 py-2.5">
              {problem}
            </p>
          ) : null}
          <p className="text-sm text-slate">
            Electronic signature (simple). Recorded with it: your printed name and role, these words, date and
            time with your time zone, and the content digest above.
          </p>
          <button type="submit" hidden aria-hidden tabIndex={-1} />
        </form>
      </div>
    </Dialog>
  );
}

function useSignForm(given: {
  gate: Gate;
  decision: 'sign' | 'return';
  isOpen: boolean;
  signOff: ReturnType<typeof useSignOff>;
  onDone: () => void;
}) {
  const { gate, decision, isOpen, signOff, onDone } = given;
  const { workspace, revision } = useRoom();
  const query = useContent(workspace.id, revision.id, isOpen);
  const [password, setPassword] = useState('');
  const [reason, setReason] = useState('');
  const [errors, setErrors] = useState<{ password?: string; reason?: string }>({});
  const [problem, setProblem] = useState<string | null>(null);
  const [key, setKey] = useState(newIdempotencyKey);
  /** The content that the signer has read; a newer one is only shown together with what changed. */
  const [read, setRead] = useState<ContentView | null>(null);
  const [changes, setChanges] = useState<string[]>([]);
  const [wasOpen, setWasOpen] = useState(isOpen);
  const element = useRef<HTMLFormElement>(null);

  // Whoever is told what is wrong stands where it is wrong.
  useEffect(() => {
    if (!errors.password && !errors.reason) return;
    element.current?.querySelector<HTMLElement>('[aria-invalid="true"]')?.focus();
  }, [errors]);

  if (wasOpen !== isOpen) {
    setWasOpen(isOpen);
    setPassword('');
    setErrors({});
    setProblem(null);
    setRead(null);
    setChanges([]);
    setKey(newIdempotencyKey());
  }
  const latest = isOpen && !query.isFetching ? (query.data ?? null) : null;
  if (latest && latest.digest !== read?.digest) {
    if (read) {
      setChanges(contentChanges(read, latest));
      setPassword('');
      setKey(newIdempotencyKey());
    }
    setRead(latest);
  }

  const refused = async (error: unknown) => {
    const { detail } = explainError(error);
    if (!(error instanceof ApiError)) return setProblem(detail);
    if (error.reason === 'wrong-password') return setErrors({ password: detail });
    if (error.reason === 'content-changed') {
      setPassword('');
      await query.refetch();
      return;
    }
    // A refusal is an answer: the next press is another request. Without an answer it is the same one again.
    if (error.status !== 0) setKey(newIdempotencyKey());
    setProblem(detail);
  };

  const submit = () => {
    if (!read || signOff.isPending) return;
    const schema = decision === 'sign' ? SignInput : ReturnInput;
    const parsed = schema.safeParse({ digest: read.digest, password, reason });
    setProblem(null);
    if (!parsed.success) {
      const issues = Object.fromEntries(parsed.error.issues.map((i) => [i.path[0], i.message]));
      return setErrors(issues);
    }
    setErrors({});
    signOff.mutate(
      {
        gateId: gate.gateId,
        digest: read.digest,
        password,
        reason: decision === 'return' ? reason.trim() : undefined,
        key,
      },
      {
        onSuccess: () => {
          notify(
            decision === 'sign'
              ? `Signed for the ${gate.gateName.toLowerCase()}. Your signature is recorded.`
              : 'Returned. The studio has been told why.',
          );
          onDone();
        },
        onError: (error) => void refused(error),
      },
    );
  };

  return {
    element,
    content: read,
    changes,
    errors,
    problem,
    password,
    reason,
    setPassword,
    setReason,
    submit,
    loadError: query.isError && !read ? query.error : null,
    reload: () => void query.refetch(),
  };
}
