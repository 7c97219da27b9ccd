import { oneLine, revisionName, type MailContent } from './content';

type AnyRevision = { workspaceName: string; number: string; title: string; letter: string };

export const facts = (request: AnyRevision): MailContent['facts'] => [
  { label: 'Template', value: `${request.number}  ${request.title}` },
  { label: 'Revision', value: request.letter },
  { label: 'Workspace', value: request.workspaceName },
];
export const footer = (request: AnyRevision) =>
  `You get this as a member of ${request.workspaceName}. The link only opens the page; nothing is signed or changed by it.`;
export const subject = (request: AnyRevision, what: string) =>
  oneLine(`${revisionName(request)} ${what} (${request.title})`);
