'use client';

import { useState } from 'react';
import { Button } from '@/app/_components/button';
import { ButtonLink } from '@/app/_components/link';
import { TitleAction } from '@/app/_components/title-action';
import { revisionApi } from '../_hooks/use-room-data';
import type { Step } from '../_hooks/use-room-commands';
import { MetaButton } from './meta-button';
import type { PrimaryStep } from './primary-step';
import { ReasonDialog } from './reason-dialog';
import { ReleaseDialog } from './release-dialog';
import { useRoom } from './room-context';
import { SignDialog } from './sign-dialog';

export type RoomDialog = 'sign' | 'return' | 'release' | Step;

/** The verdigris end of the title block. */
export function PrimaryAction(props: {
  step: PrimaryStep;
  onOpen: (dialog: RoomDialog) => void;
  /** Goes to the first item that keeps the gate shut. */
  onSettle: () => void;
}) {
  const { step, onOpen, onSettle } = props;
  if (step.kind === 'settle') {
    return <TitleAction label={step.label} detail={step.detail} onPress={onSettle} />;
  }
  if (step.kind === 'sign' || step.kind === 'release') {
    return <TitleAction label={step.label} detail={step.detail} onPress={() => onOpen(step.kind)} />;
  }
  return (
    <TitleAction label={step.label} detail={step.detail} href={step.href} isFile={step.kind === 'download'} />
  );
}

const fileLink =
  'px-1 py-0.5 text-base text-verdigris underline decoration-verdigris/50 underline-offset-3 hover:decoration-current pointer-coarse:py-2.5';

/** What else can be done with the revision, in one quiet line below the title block. */
export function RoomActions({
  step,
  onOpen,
}: {
  step: PrimaryStep | null;
  onOpen: (dialog: RoomDialog) => void;
}) {
  const { workspace, revision } = useRoom();
  const { can } = revision;
  const api = revisionApi(workspace.id, revision.id);
  return (
    <div className="flex flex-wrap items-center gap-2 print:hidden sm:ml-auto">
      {can.sign ? <Button onPress={() => onOpen('return')}>Return with a reason</Button> : null}
      {can.withdraw ? <Button onPress={() => onOpen('withdraw')}>Withdraw</Button> : null}
      {can.recall ? <Button onPress={() => onOpen('recall')}>Recall</Button> : null}
      {can.retire ? <Button onPress={() => onOpen('retire')}>Retire</Button> : null}
      {can.post && step?.kind !== 'post' ? (
        <ButtonLink href={`/w/${workspace.slug}/templates/${revision.template.id}/post`}>
          Post the next revision
        </ButtonLink>
      ) : null}
      {revision.release?.pack && can.download && step?.kind !== 'download' ? (
        <a className={fileLink} href={`${api}/pack`}>
          Download the pack
        </a>
      ) : null}
      {can.mesh !== false ? (
        <a className={fileLink} href={`${api}/mesh`}>
          Download the mesh
        </a>
      ) : null}
      <MetaButton onPress={() => window.print()} className="px-1 text-base!">
        Print this page
      </MetaButton>
    </div>
  );
}

/** The dialogs of the room; one at most is open. */
export function RoomDialogs({ open, onClose }: { open: RoomDialog | null; onClose: () => void }) {
  const { revision } = useRoom();
  // The right to sign ends with the signature; the dialog keeps its gate until it is closed.
  const [gate, setGate] = useState(revision.can.sign);
  if (revision.can.sign && revision.can.sign.gateId !== gate?.gateId) setGate(revision.can.sign);
  const onOpenChange = (isOpen: boolean) => {
    if (!isOpen) onClose();
  };
  return (
    <>
      {gate && (open === 'sign' || open === 'return') ? (
        <SignDialog gate={gate} decision={open} isOpen onOpenChange={onOpenChange} />
      ) : null}
      {open === 'release' ? <ReleaseDialog isOpen onOpenChange={onOpenChange} /> : null}
      {open === 'withdraw' || open === 'recall' || open === 'retire' ? (
        <ReasonDialog key={open} step={open} isOpen onOpenChange={onOpenChange} />
      ) : null}
    </>
  );
}
