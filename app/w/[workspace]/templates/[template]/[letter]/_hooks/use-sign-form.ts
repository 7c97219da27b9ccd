'use client';

import { useState } from 'react';
import { ApiError, explainError, newIdempotencyKey } from '@/app/_components/api-client';
import { notify } from '@/app/_components/notices';
import { ReturnInput, SignInput, type ContentView, type RevisionView } from '@/lib/review/schemas';
import { contentChanges } from '../_components/content-changes';
import { gateInWords } from '../_components/gate-in-words';
import { useRoom } from '../_components/room-context';
import type { useSignOff } from './use-room-commands';
import { useContent } from './use-room-data';

export type SigningGate = NonNullable<RevisionView['can']['sign']>;

/**
 * What a signer fills in and is shown. A content that changes while the dialog is open is never signed unread: what
 * changed is listed, and the password is asked again.
 */
export function useSignForm(given: {
  gate: SigningGate;
  decision: 'sign' | 'return';
  isOpen: boolean;
  signOff: ReturnType<typeof useSignOff>;
  onDone: () => void;
}) {
  const { gate, decision, isOpen, signOff, onDone } = given;
  const { workspace, revision, reader } = useRoom();
  const query = useContent(workspace.id, revision.id, isOpen);
  const [password, setPassword] = useState('');
  const [code, setCode] = useState('');
  /** Also when the second factor was turned on after the page was loaded. */
  const [asksCode, setAsksCode] = useState(reader.asksCode);
  const [reason, setReason] = useState('');
  const [errors, setErrors] = useState<{ password?: string; code?: string; reason?: string }>({});
  const [problem, setProblem] = useState<string | null>(null);
  const [key, setKey] = useState(newIdempotencyKey);
  /** The content that the signer has read; a newer one is only shown together with what changed. */
  const [read, setRead] = useState<ContentView | null>(null);
  const [changes, setChanges] = useState<string[]>([]);
  const [wasOpen, setWasOpen] = useState(isOpen);

  if (wasOpen !== isOpen) {
    setWasOpen(isOpen);
    setPassword('');
    setCode('');
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
    if (error.reason === 'code-needed' || error.reason === 'wrong-code') {
      setAsksCode(true);
      setCode('');
      return setErrors({ code: detail });
    }
    // A code serves once, whatever came of it.
    setCode('');
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
    const given = asksCode ? { digest: read.digest, password, code } : { digest: read.digest, password };
    const parsed = schema.safeParse({ ...given, reason });
    setProblem(null);
    if (!parsed.success) {
      const issues = Object.fromEntries(parsed.error.issues.map((i) => [i.path[0], i.message]));
      return setErrors(issues);
    }
    setErrors({});
    signOff.mutate(
      {
        gateId: gate.gateId,
        ...given,
        reason: decision === 'return' ? reason.trim() : undefined,
        key,
      },
      {
        onSuccess: () => {
          notify(
            decision === 'sign'
              ? `Signed for ${gateInWords(gate.gateName)}. Your signature is recorded.`
              : 'Returned. The studio has been told why.',
          );
          onDone();
        },
        onError: (error) => void refused(error),
      },
    );
  };

  return {
    content: read,
    changes,
    errors,
    problem,
    password,
    reason,
    code,
    asksCode,
    setPassword,
    setCode,
    setReason,
    submit,
    loadError: query.isError && !read ? query.error : null,
    reload: () => void query.refetch(),
  };
}
