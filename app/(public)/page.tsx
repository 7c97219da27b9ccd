import { redirect } from 'next/navigation';
import { currentPerson } from '@/lib/auth/session';
import { checkName } from '@/lib/review/check-words';
import { ButtonLink } from '../_components/link';
import { SectionDrawing } from './_components/section-drawing';

/** In the words of a sentence: a pocket without a vent is what the check on vents finds. */
const checked = ['draft', 'undercuts', 'pockets without a vent', 'layer lines', 'edges', 'draw'].concat(
  ['sheet', 'air', 'skin', 'walls', 'heat'].map((id) => checkName(id).toLowerCase()),
);
const sentence = (names: readonly string[]) => {
  const last = names[names.length - 1];
  const words = `${names.slice(0, -1).join(', ')} and ${last}`;
  return words.charAt(0).toUpperCase() + words.slice(1);
};

const promises = [
  {
    title: 'See what waits on you',
    text: 'One page says which revision needs your answer or your signature, in which workspace, and since when.',
  },
  {
    title: 'See whether it will form',
    text: `${sentence(checked)} are checked on every revision: what was measured, where, what is wanted, and what to change.`,
  },
  {
    title: 'Know what was agreed',
    text: 'Studio and client sign at gates. The last signature locks the mesh, the recipe and the report together, and production gets exactly those bytes.',
  },
];

export default async function HomePage({ searchParams }: { searchParams: Promise<{ error?: string }> }) {
  // A mailed link that has run out comes back here with its error.
  const { error } = await searchParams;
  if (error) redirect(`/verify?error=${encodeURIComponent(error)}`);
  if (await currentPerson()) redirect('/today');
  return (
    <div className="flex flex-col gap-10">
      <div className="flex flex-col gap-5">
        <h1 className="max-w-[26ch] text-2xl text-balance font-semibold sm:text-3xl">
          Agree the template before it is printed, and get the first pull right.
        </h1>
        <p className="max-w-prose text-md text-slate">
          A forming template takes hours to print and a sheet for every try. Firstpull is where the studio
          that makes it, the client who ordered it and the people who will form over it settle it first.
        </p>
        <div className="flex flex-wrap items-center gap-x-5 gap-y-3">
          <ButtonLink href="/sign-in" variant="primary" size="roomy">
            Sign in
          </ButtonLink>
          <p className="text-base text-slate">Invited? Open the link in the mail.</p>
        </div>
      </div>
      <SectionDrawing />
      <ul className="grid gap-x-8 gap-y-6 sm:grid-cols-3">
        {promises.map((promise) => (
          <li key={promise.title} className="border-t border-ink pt-3">
            <h2 className="text-md font-semibold">{promise.title}</h2>
            <p className="mt-1 text-base text-slate">{promise.text}</p>
          </li>
        ))}
      </ul>
    </div>
  );
}
