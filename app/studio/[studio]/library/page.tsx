import type { Metadata } from 'next';
import { Caution } from '@/app/_components/caution';
import { PageHeader } from '@/app/_components/page-header';
import { SectionHead } from '@/app/_components/section-head';
import { enterStudioPage } from '@/app/_frames/enter-page';
import { StudioFrame } from '@/app/_frames/studio-frame';
import { readLibrary } from '@/lib/studio/read-library';
import { libraryKinds } from '@/lib/studio/schemas';
import { LimitsForm } from './_components/limits-form';
import { Shelf } from './_components/shelf';

type Props = { params: Promise<{ studio: string }> };

export const metadata: Metadata = { title: 'Library' };

/** The studio's machines, printers, sheets, template materials and limits. */
export default async function LibraryPage({ params }: Props) {
  const ctx = await enterStudioPage((await params).studio);
  const library = await readLibrary(ctx);
  const apiPath = `/api/v1/studios/${ctx.studio.slug}`;
  return (
    <StudioFrame ctx={ctx} page="library">
      <PageHeader
        title="Library"
        kicker={ctx.studio.name}
        lead="New recipes start from these values. Recipes that were posted keep the ones they were posted with."
      />
      <Caution title="Hot sheet, pressure, fumes">
        Temperatures and pressures here are starting points to be proven by a test pull. The papers of the
        machine and of the material, local rules and trained people come first.
      </Caution>
      <div className="mt-7">
        {libraryKinds.map((kind) => (
          <Shelf
            key={kind}
            kind={kind}
            items={library[kind]}
            apiPath={apiPath}
            mayChange={library.mayChange}
          />
        ))}
      </div>
      <section aria-labelledby="limits">
        <SectionHead id="limits" title="Limits" />
        <p className="mb-2 max-w-prose text-sm text-slate">
          What the checks hold a revision against, and what each limit rests on. A lead may move them; who
          moved what is recorded.
        </p>
        <LimitsForm
          key={library.limits.version}
          apiPath={apiPath}
          limits={library.limits}
          maySet={library.maySetLimits}
        />
      </section>
    </StudioFrame>
  );
}
