import type { HouseRuleVerdict } from '@/shared/house-rules.ts';

/** How a verdict is called, aloud and beside its sign. */
export const verdictText: Readonly<Record<HouseRuleVerdict['state'], string>> = {
  holds: 'Kept',
  broken: 'Not kept',
  unclear: 'Can’t be told',
};

export const houseRulesText = {
  title: 'House rules',
  words:
    'What this plant asks of every pierce. Each draft is judged by them whenever it is looked at; what was handed in keeps what they said that day.',
  list: 'Rules in force',
  ended: 'Rules that ended',
  fetching: 'Fetching the house rules',
  empty: {
    title: 'No house rule yet',
    words: 'A rule compares what a pierce comes to with what this plant accepts, as in craterRadius <= 1.5 mm.',
  },
  add: 'Add a rule',
  change: 'Change',
  changeOf: (sentence: string) => `Change the rule: ${sentence}`,
  changing: 'Change the rule',
  save: 'Save as its next version',
  end: 'End',
  endOf: (sentence: string) => `End the rule: ${sentence}`,
  endTitle: 'End this rule?',
  endWords: 'From now on it is asked of no pierce. What it said of revisions handed in stays with them.',
  endNow: 'End the rule',
  founded: 'there from the start',
  version: (version: number, who: string, when: string) => `version ${version}, ${who}, ${when}`,
  endedBy: (who: string, when: string) => `ended by ${who}, ${when}`,
  blocks: 'A draft that does not keep it can’t be handed in.',
  loose: 'A draft that does not keep it can be handed in; whoever decides sees it.',
  fields: {
    expression: 'Rule',
    expressionHint: 'Names from the list, numbers with units, comparisons; and, or, not between them.',
    sentence: 'In a sentence',
    sentenceHint: 'What engineers and whoever decides read, as in “The crater stays within 1.5 mm”.',
    blocks: 'Must be kept before a draft is handed in',
    blocksHint: 'Also where nothing can be told, as of the reserve of a pierce that is never through.',
  },
  reading: 'Reading it',
  unread: 'Whether it can be read is told once the server answers.',
  understood: 'This is a rule.',
  tried: (where: string, state: HouseRuleVerdict['state'], why: string) => `On ${where}: ${said[state]} ${why}`,
  newest: 'the revision changed last',
  names: 'Names a rule may use',
  namesAt: (strategy: string, number: number) => `Values are those of “${strategy}”, revision ${number}.`,
  namesWithout: 'Values stand here once the plant has a revision.',
  namesFetching: 'Fetching the values',
  put: (name: string) => `Put ${name} into the rule`,
  as: (meaning: string, example: string) => `${meaning}, as in ${example}`,
  noValue: 'none',
  hide: 'Hide those that are kept',
  kept: (number: number) => (number === 1 ? 'Show the one that is kept' : `Show the ${number} that are kept`),
  allKept: (number: number) => (number === 1 ? 'The one house rule is kept.' : `All ${number} house rules are kept.`),
  none: 'No house rule was asked of it.',
  inTheWay: 'It can’t be handed in before this is kept.',
  behind: 'Of the last numbers that could be judged, not of those on the screen.',
} as const;

const said: Readonly<Record<HouseRuleVerdict['state'], string>> = {
  holds: 'it holds.',
  broken: 'it is not kept.',
  unclear: 'it can’t be told.',
};
