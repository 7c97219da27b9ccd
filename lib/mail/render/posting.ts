import type { MailRequest } from '../messages';
import { oneLine, revisionName, type MailContent } from './content';
import { facts, footer, subject } from './revision-parts';

type Of<T extends MailRequest['template']> = Extract<MailRequest, { template: T }>;

const counted = (n: number, one: string, many: string) => (n === 1 ? `one ${one}` : `${n} ${many}`);

/** To the studio's people, at once. */
export function revisionPosted(request: Of<'revision-posted'>, url: string): MailContent {
  const { authorName, note, replaces } = request;
  return {
    subject: subject(request, 'is posted'),
    heading: `${authorName} posted ${revisionName(request)}`,
    preview: note ? oneLine(note) : 'It is being checked for forming.',
    paragraphs: [
      'Mesh and recipe are frozen from now on. The check for forming runs by itself.',
      ...(replaces ? [`It takes the place of revision ${replaces}, which is withdrawn.`] : []),
    ],
    quote: note ? { by: authorName, text: note } : undefined,
    facts: facts(request),
    action: { label: 'Look at the revision', url },
    footer: footer(request),
  };
}

/** To the client's people, once there is something to look at. */
export function revisionChecked(request: Of<'revision-checked'>, url: string): MailContent {
  const { authorName, note, look, waived, notRun } = request;
  const found =
    look === 0
      ? 'Nothing that was checked stands against forming it.'
      : `Nothing that was checked keeps it from forming; ${counted(look, 'finding is', 'findings are')} left to look at.`;
  const stand = `The studio has let ${counted(waived, 'failing finding', 'failing findings')} stand; the reason is on the revision’s page.`;
  const judged = waived
    ? look
      ? `${stand} ${look === 1 ? 'One more finding is' : `${look} more findings are`} left to look at.`
      : stand
    : found;
  const unrun = notRun === 1 ? 'One check was not run.' : `${notRun} checks were not run.`;
  const said = notRun ? `${judged} ${unrun}` : judged;
  return {
    subject: subject(request, 'is posted and checked'),
    heading: `${revisionName(request)} is posted and checked: you can look at it`,
    preview: said,
    paragraphs: [
      said,
      'Turn the model, read the findings, and write notes where something should be otherwise. If your signature is needed, another mail says so. What the check says is an estimate, to be proven by a test pull.',
    ],
    quote: note ? { by: authorName, text: note } : undefined,
    facts: facts(request),
    action: { label: 'Look at the revision', url },
    footer: footer(request),
  };
}

/** To who posted it: the remedies are theirs to carry out. */
export function checkFails(request: Of<'check-fails'>, url: string): MailContent {
  const { failing } = request;
  const many = counted(failing.length, 'check fails', 'checks fail');
  const head = many.charAt(0).toUpperCase() + many.slice(1);
  return {
    subject: subject(request, `will not form as it is: ${many}`),
    heading: `${head} on ${revisionName(request)}`,
    preview: oneLine(failing.map(({ check }) => check).join(', ')),
    paragraphs: [
      'No gate opens while a failing finding stands. Change the template or its recipe and post the next revision; a lead may let a finding stand, with a reason that stays on record.',
    ],
    facts: [...facts(request), ...failing.map(({ check, remedy }) => ({ label: check, value: remedy }))],
    action: { label: 'See where, and what to change', url },
    footer: footer(request),
  };
}

/** To who posted it: the run ended without a report. */
export function checkGivenUp(request: Of<'check-given-up'>, url: string): MailContent {
  const { reason } = request;
  return {
    subject: subject(request, 'could not be checked'),
    heading: `The check of ${revisionName(request)} did not come to its end`,
    preview: oneLine(reason),
    paragraphs: [
      reason,
      'Nothing is known of whether it forms, and no gate opens. The check can be ordered again on its page.',
    ],
    facts: facts(request),
    action: { label: 'Open the revision', url },
    footer: footer(request),
  };
}

export function revisionWithdrawn(request: Of<'revision-withdrawn'>, url: string): MailContent {
  const { printedName, reason } = request;
  return {
    subject: subject(request, 'is withdrawn'),
    heading: `${printedName} withdrew ${revisionName(request)}`,
    preview: oneLine(reason),
    paragraphs: ['There is nothing to look at or to sign on it any more. It stays to be read.'],
    quote: { by: printedName, text: reason },
    facts: facts(request),
    action: { label: 'See the revision', url },
    footer: footer(request),
  };
}
