import { writtenDay } from '@/lib/time/written-day';
import type { MailRequest } from '../messages';
import { oneLine, type MailContent } from './content';

/** To whom was asked to sign for somebody who is away. */
export function standInNamed(
  request: Extract<MailRequest, { template: 'stand-in-named' }>,
  url: string,
): MailContent {
  const { awayName, workspaceName, fromOn, untilOn } = request;
  const days =
    fromOn === untilOn ? `on ${writtenDay(fromOn)}` : `from ${writtenDay(fromOn)} to ${writtenDay(untilOn)}`;
  return {
    subject: oneLine(`You sign for ${awayName} ${days} (${workspaceName})`),
    heading: `${awayName} asks you to sign for them`,
    preview: oneLine(`In ${workspaceName}, ${days}.`),
    paragraphs: [
      `In ${workspaceName} you stand in for ${awayName} ${days}: where a gate asks for their name, yours stands for it, and says so.`,
      'It gives you no right that they do not have. You never sign a revision of your own under four eyes, nor one of theirs in their place.',
    ],
    facts: [
      { label: 'Workspace', value: workspaceName },
      { label: 'From', value: writtenDay(fromOn) },
      { label: 'To', value: writtenDay(untilOn) },
    ],
    action: { label: 'See who signs what', url },
    footer: `You get this as a member of ${workspaceName}. The link only opens the page; nothing is signed or changed by it.`,
  };
}
