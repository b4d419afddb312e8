import { piercePropose, type PierceProposal, type ProposeInput } from '@/strategy/pierce/index.ts';
import { houseRuleProposed, type HouseRuleText } from '@/strategy/rules/index.ts';

/** What the worker is asked: the house rules as they were written, since a function cannot be sent. */
export type ProposeAsked = Omit<ProposeInput, 'rules'> & { readonly houseRules: readonly HouseRuleText[] };

/** What the worker says: how far it is, the answer, or why the question cannot be asked. */
export type ProposeSaid =
  { kind: 'progress'; share: number } | { kind: 'done'; proposal: PierceProposal } | { kind: 'refused'; why: string };

/** Works out a proposal that keeps the house rules too; says how far it is and, last, what came of it. */
export function proposeAnswer({ houseRules, ...input }: ProposeAsked, say: (said: ProposeSaid) => void): void {
  try {
    const rules = houseRules.map(houseRuleProposed);
    say({ kind: 'done', proposal: piercePropose({ ...input, rules }, (share) => say({ kind: 'progress', share })) });
  } catch (error) {
    say({ kind: 'refused', why: error instanceof Error ? error.message : String(error) });
  }
}

globalThis.onmessage = ({ data }: MessageEvent<ProposeAsked>) =>
  proposeAnswer(data, (said) => globalThis.postMessage(said));
