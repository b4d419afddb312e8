import { act, renderHook, waitFor } from '@testing-library/react';
import { describe, expect, it } from 'vitest';
import { useDraftProposal } from '@/components/pierce/use-draft-proposal.ts';
import type { HouseRuleVerdict } from '@/shared/house-rules.ts';
import { DEFAULT_RESERVE_RULES } from '@/strategy/pierce/index.ts';
import { TEN_KILOWATT } from '../support/machines.ts';
import { ids } from '../support/page.tsx';
import { content, nozzle } from './strategy-fixtures.ts';

const verdict = (expression: string, sentence: string, blocks = true): HouseRuleVerdict => ({
  ruleId: ids.other,
  expression,
  sentence,
  blocks,
  state: 'holds',
  why: '',
});

/** What the designer answers for the draft under house rules, as the page asks it. */
async function answered(houseRules: HouseRuleVerdict[]) {
  const asked = { content, sound: true, profile: TEN_KILOWATT, nozzle, rules: DEFAULT_RESERVE_RULES };
  const { result, rerender } = renderHook(
    (rules: HouseRuleVerdict[]) => useDraftProposal({ ...asked, houseRules: rules }),
    {
      initialProps: houseRules,
    },
  );
  act(() => {
    const { ground, begin } = result.current;
    if (ground === null) throw new Error('nothing to start from');
    begin({ ...ground, reserve: DEFAULT_RESERVE_RULES });
  });
  await waitFor(() => expect(result.current.state.kind).not.toBe('working'), { timeout: 15_000 });
  const { state } = result.current;
  if (state.kind !== 'answered') throw new Error(state.kind);
  return { proposal: state.proposal, result, rerender };
}

describe('a proposal under the plant’s house rules', { timeout: 60_000 }, () => {
  it('keeps each that blocks, and only those', async () => {
    const { proposal: free } = await answered([]);
    if (free.kind !== 'ok') throw new Error(free.why);
    const most = Math.round(free.prediction.peakPower * 0.8);
    const rule = `peakPower <= ${most} W`;
    const { proposal: bound } = await answered([verdict(rule, 'The head stays below its rating.')]);
    if (bound.kind !== 'ok') throw new Error(bound.why);
    expect(bound.prediction.peakPower).toBeLessThanOrEqual(most);
    expect(bound.stages).not.toEqual(free.stages);
    const { proposal: advised } = await answered([verdict(rule, 'The head stays below its rating.', false)]);
    expect(advised.kind === 'ok' && advised.stages).toEqual(free.stages);
  });

  it('that cannot be kept says so in the lead’s words, and what would have to give', async () => {
    const { proposal } = await answered([verdict('routineTime <= 2 s', 'A pierce takes two seconds at most.')]);
    if (proposal.kind !== 'none') throw new Error(proposal.kind);
    expect(proposal.inTheWay.map(({ sentence }) => sentence)).toContainEqual(
      expect.stringMatching(
        /“A pierce takes two seconds at most\.” With everything else kept, routineTime is \d+(\.\d+)? s\./,
      ),
    );
  });

  it('is put away when a rule is written anew', async () => {
    const { result, rerender } = await answered([verdict('stageCount <= 5', 'Five stages at most.')]);
    rerender([verdict('stageCount <= 3', 'Three stages at most.')]);
    expect(result.current.state.kind).toBe('idle');
    expect(result.current.proposed).toBeNull();
  });
});
