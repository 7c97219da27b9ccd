'use client';

import { useEffect, useRef } from 'react';
import { explainError } from '@/app/_components/api-client';
import { Button } from '@/app/_components/button';
import { Dialog } from '@/app/_components/dialog';
import { ErrorState } from '@/app/_components/error-state';
import { CodeField } from '@/app/_components/code-field';
import { PasswordField } from '@/app/_components/password-field';
import { Skeleton } from '@/app/_components/skeleton';
import { TextArea } from '@/app/_components/text-field';
import { useSignOff } from '../_hooks/use-room-commands';
import { useSignForm, type SigningGate } from '../_hooks/use-sign-form';
import { ContentSummary } from './content-summary';
import { gateInWords, theGate } from './gate-in-words';
import { useRoom } from './room-context';

export interface SignDialogProps {
  gate: SigningGate;
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
      ? `Sign for ${gateInWords(gate.gateName)}`
      : `Return revision ${revision.letter} of ${revision.template.number}`;
  const form = useSignForm({ gate, decision, isOpen, signOff, onDone: () => onOpenChange(false) });
  const { content, problem, errors } = form;
  const element = useRef<HTMLFormElement>(null);
  // Whoever is told what is wrong stands where it is wrong.
  useEffect(() => {
    if (!errors.password && !errors.code && !errors.reason) return;
    element.current?.querySelector<HTMLElement>('[aria-invalid="true"]')?.focus();
  }, [errors]);
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
          ref={element}
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
                By signing I, <strong className="font-semibold">{reader.name}</strong>, {reader.role}
                {gate.standsFor ? ` and stand-in for ${gate.standsFor}` : ''}, state:{' '}
                <strong className="font-semibold">{gate.meaning}</strong>
              </>
            ) : (
              <>
                I, <strong className="font-semibold">{reader.name}</strong>, {reader.role}
                {gate.standsFor ? ` and stand-in for ${gate.standsFor}` : ''}, return this revision at{' '}
                {theGate(gate.gateName)}.
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
          {form.asksCode ? (
            <CodeField
              value={form.code}
              onChange={form.setCode}
              error={errors.code}
              help="Each code works once."
              roomy
            />
          ) : null}
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
