import { shortCautions } from '@/lib/production/cautions';
import { writtenDay } from '@/lib/time/written-day';
import { zonedTime } from '@/lib/time/zoned-time';
import type { MailRequest } from '../messages';
import { oneLine, revisionName, type MailContent } from './content';
import { facts, footer, subject } from './revision-parts';

type Of<T extends MailRequest['template']> = Extract<MailRequest, { template: T }>;

const openWords = (openItems: number) =>
  openItems === 0
    ? 'Nothing on its docket must be settled first.'
    : openItems === 1
      ? 'One item on its docket must be settled first.'
      : `${openItems} items on its docket must be settled first.`;
const due = (on: string | null) => (on ? [{ label: 'Due', value: writtenDay(on) }] : []);

export function gateWaits(request: Of<'gate-waits'>, url: string): MailContent {
  const { gateName, openItems } = request;
  const items = openWords(openItems);
  return {
    subject: subject(request, 'waits for your signature'),
    heading: `${revisionName(request)} waits for you at the gate ${gateName}`,
    preview: items,
    paragraphs: [
      `${items} Look at the model, the findings and the notes, then sign or return it with a reason.`,
    ],
    facts: [...facts(request), { label: 'Gate', value: gateName }, ...due(request.dueOn)],
    action: { label: 'Look and decide', url },
    footer: footer(request),
  };
}

export function gateDue(request: Of<'gate-due'>, url: string): MailContent {
  const { gateName, openItems, when, dueOn, standsFor } = request;
  const items = openWords(openItems);
  return {
    subject: subject(request, `is due for your signature ${when}`),
    heading: `${revisionName(request)} is to be decided at the gate ${gateName} ${when}`,
    preview: items,
    paragraphs: [
      `${items} Sign it, or return it with a reason.`,
      ...(standsFor ? [`You stand in for ${standsFor} at this gate.`] : []),
    ],
    facts: [...facts(request), { label: 'Gate', value: gateName }, ...due(dueOn)],
    action: { label: 'Look and decide', url },
    footer: footer(request),
  };
}

export function gateShort(request: Of<'gate-short'>, url: string): MailContent {
  const { gateName, needed, have, left } = request;
  const who = left === 0 ? 'nobody is left' : left === 1 ? 'one person is left' : `${left} people are left`;
  const why = request.held
    ? 'Somebody whose name was missing has left, and all who are left have signed, but something was changed since (a note, an answer, a waiver, the title): nobody has signed what stands there now'
    : `The gate asks for ${needed === 1 ? 'one signature' : `${needed} signatures`} and has ${have === 0 ? 'none' : have}, but ${who} who may sign`;
  return {
    subject: subject(request, `cannot pass ${gateName} as things stand`),
    heading: `${revisionName(request)} cannot pass the gate ${gateName} as things stand`,
    preview: oneLine(`${why}.`),
    paragraphs: [
      `${why}.`,
      'Invite somebody in a role that the gate asks, or change the gate plan and post the next revision under it: a revision in review keeps the plan that it started with.',
    ],
    facts: [...facts(request), { label: 'Gate', value: gateName }],
    action: { label: 'See the revision', url },
    footer: footer(request),
  };
}

export function notePosted(request: Of<'note-posted'>, url: string): MailContent {
  const { authorName, text, mentioned } = request;
  return {
    subject: subject(request, mentioned ? 'has a note that mentions you' : `has a note by ${authorName}`),
    heading: mentioned
      ? `${authorName} mentions you on ${revisionName(request)}`
      : `${authorName} wrote on ${revisionName(request)}`,
    preview: oneLine(text),
    paragraphs: [],
    quote: { by: authorName, text },
    facts: facts(request),
    action: { label: 'Answer on the docket', url },
    footer: footer(request),
  };
}

export function revisionSigned(request: Of<'revision-signed'>, url: string): MailContent {
  const { meaning, signedAt, timeZone, digest, locked, signedFor } = request;
  const printedName = request.printedName;
  const role = signedFor ? `${request.role}, for ${signedFor}` : request.role;
  return {
    subject: subject(request, locked ? 'is approved and locked' : `is signed by ${printedName}`),
    heading: locked
      ? `${revisionName(request)} is approved and locked`
      : `${printedName} signed ${revisionName(request)}`,
    preview: oneLine(`${printedName}, ${role}: ${meaning}`),
    paragraphs: [
      locked
        ? 'All gates have passed. Mesh, recipe, report, docket and signatures can no longer be changed by anybody; a change is a new revision.'
        : 'The signature stands on exactly the content with the digest below.',
    ],
    quote: { by: `${printedName}, ${role}`, text: meaning },
    facts: [
      ...facts(request),
      { label: 'Signed', value: zonedTime(signedAt, timeZone), code: true },
      { label: 'Content digest', value: digest, code: true },
    ],
    action: { label: 'See what was agreed', url },
    footer: `${footer(request)} If you did not expect a signature in this name, tell a lead of the studio.`,
  };
}

export function revisionReturned(request: Of<'revision-returned'>, url: string): MailContent {
  const { printedName, role, reason } = request;
  return {
    subject: subject(request, 'is returned'),
    heading: `${printedName} returned ${revisionName(request)}`,
    preview: oneLine(reason),
    paragraphs: ['The revision is closed. What is open on its docket moves on to the next one.'],
    quote: { by: `${printedName}, ${role}`, text: reason },
    facts: facts(request),
    action: { label: 'See what must change', url },
    footer: footer(request),
  };
}

export function revisionReleased(request: Of<'revision-released'>, url: string): MailContent {
  const { printedName, note, digest } = request;
  return {
    subject: subject(request, 'is released to production'),
    heading: `${printedName} released ${revisionName(request)} to production`,
    preview: note ? oneLine(note) : 'Its release pack is on the revision’s page.',
    paragraphs: [
      'The release pack holds the exact mesh, the recipe, the report, the signatures and their certificate, with sums to check them by. It is on the revision’s page as soon as it is built, usually within a minute.',
      'Make only from the pack of this revision, not from a file that came another way.',
    ],
    quote: note ? { by: printedName, text: note } : undefined,
    facts: [...facts(request), { label: 'Content digest', value: digest, code: true }],
    action: { label: 'Get the release pack', url },
    cautions: shortCautions,
    footer: footer(request),
  };
}

export function revisionRecalled(request: Of<'revision-recalled'>, url: string): MailContent {
  const { printedName, reason } = request;
  return {
    subject: subject(request, 'is RECALLED: stop making it'),
    heading: `${printedName} recalled ${revisionName(request)}`,
    preview: oneLine(reason),
    paragraphs: [
      'Stop printing and forming from this revision, and set aside what was made from it until the studio says what to do with it.',
    ],
    quote: { by: printedName, text: reason },
    facts: facts(request),
    action: { label: 'See the revision', url },
    cautions: [shortCautions[1], shortCautions[2]],
    footer: footer(request),
  };
}

export function revisionRetired(request: Of<'revision-retired'>, url: string): MailContent {
  const { printedName, reason } = request;
  return {
    subject: subject(request, 'is retired'),
    heading: `${printedName} retired ${revisionName(request)}`,
    preview: oneLine(reason),
    paragraphs: ['Nothing new is made from this revision. Its records stay.'],
    quote: { by: printedName, text: reason },
    facts: facts(request),
    action: { label: 'See the revision', url },
    footer: footer(request),
  };
}
