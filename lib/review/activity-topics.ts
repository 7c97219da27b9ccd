import { knownActions } from './activity-words';
import type { ListActivityInput } from './schemas';

/** What the record can be narrowed to; an action may belong to more than one topic. */
export type ActivityTopic = NonNullable<ListActivityInput['about']>;

const belongs: Record<ActivityTopic, RegExp> = {
  agreement: /^(gate\.|finding\.waived|revision\.(locked|released|recalled|retired|superseded)|pack\.)/,
  revisions: /^(template|draft|upload|revision|check)\./,
  docket: /^(thread|note|finding)\./,
  people: /^(workspace|person|invitation|gate-plan|stand-in)\./,
};

/** The actions of a topic. */
export const actionsAbout = (topic: ActivityTopic): string[] =>
  knownActions.filter((action) => belongs[topic].test(action));
