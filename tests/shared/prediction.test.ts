import { describe, expect, test } from 'vitest';
import { reserveRulesOf } from '../../shared/prediction.ts';
import { DEFAULT_RESERVE_RULES } from '../../strategy/pierce/index.ts';

describe('the least reserves a plant asks for', () => {
  test.each([
    ['are the usual ones where no rule speaks of them', [], DEFAULT_RESERVE_RULES],
    ['are what the rules say, cold and hot apart', ['reserveCold >= 1.8', 'reserveHot > 2.5'], { cold: 1.8, hot: 2.5 }],
    [
      'are the strictest of several, in whatever order',
      ['reserveCold >= 3', 'reserveCold ≥ 2.5', ' reserveCold  >=  2 '],
      { cold: 3, hot: DEFAULT_RESERVE_RULES.hot },
    ],
    [
      'are not read out of rules that say more than that',
      ['reserveCold >= 3 or stageCount > 2', 'reserveCold <= 9', 'not (reserveHot >= 4)', 'reserveHot >= reserveCold'],
      DEFAULT_RESERVE_RULES,
    ],
  ])('%s', (_law, expressions, least) => {
    expect(reserveRulesOf(expressions)).toEqual(least);
  });
});
