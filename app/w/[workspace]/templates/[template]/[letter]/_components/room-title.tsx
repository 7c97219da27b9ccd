'use client';

import type { ReactNode } from 'react';
import { Digest } from '@/app/_components/digest';
import { GateLine, type GateStep } from '@/app/_components/gate-line';
import { usePreferences } from '@/app/_components/preferences-context';
import { Time } from '@/app/_components/time';
import { TitleBlock } from '@/app/_components/title-block';
import type { RevisionView } from '@/lib/review/schemas';
import { describeRecipe } from './describe-recipe';
import { RevisionSwitcher } from './revision-switcher';

/** Identity of the revision, this reader's next step, and the gate line, in one frame. */
export function RoomTitle(props: { revision: RevisionView; gates: readonly GateStep[]; action: ReactNode }) {
  const { revision, gates, action } = props;
  const { units } = usePreferences();
  const { sheet, template } = describeRecipe(revision.recipe, units);
  return (
    <TitleBlock
      fields={[
        { label: 'Number', value: revision.template.number, style: 'large' },
        { label: 'Title', value: revision.template.title, style: 'large', grow: 3 },
        { label: 'Revision', value: <RevisionSwitcher revision={revision} />, style: 'large' },
        { label: 'Sheet', value: sheet },
        { label: 'Template', value: template },
        {
          label: 'Posted',
          value: (
            <>
              {revision.author.name}, <Time at={revision.postedAt} show="day" />
            </>
          ),
        },
        {
          label: 'Content digest',
          value: revision.contentDigest ? (
            <Digest value={revision.contentDigest} />
          ) : (
            <span className="font-sans text-slate">after the check</span>
          ),
          style: 'mono',
        },
      ]}
      action={action}
    >
      <GateLine gates={gates} />
    </TitleBlock>
  );
}
