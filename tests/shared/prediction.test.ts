import { describe, expect, test } from 'vitest';
import { cardEstimate, predictionOf, reserveRulesOf } from '../../shared/prediction.ts';
import { predictionSchema } from '../../shared/strategies.ts';
import { DEFAULT_RESERVE_RULES, type PierceFit } from '../../strategy/pierce/index.ts';
import { FOUR_KILOWATT, NOZZLE_1_5 } from '../support/machines.ts';
import { testContent } from '../support/plant.ts';

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

describe('a model fitted to the machine’s test cuts', () => {
  const judged = {
    content: testContent({ machineRevisionId: 'machine', nozzleId: 'nozzle' }),
    profile: FOUR_KILOWATT,
    nozzle: NOZZLE_1_5,
  };
  const fit: PierceFit = {
    parameters: { coupling: 0.45 },
    names: ['coupling'],
    covariance: [[0.001]],
    coverage: 1.96,
    trials: null,
  };

  test('says how sure it is, in what is stored and sent; without one nothing is said of it', () => {
    const fitted = predictionOf({ ...judged, fit });
    const { breakthrough, interval } = fitted.cold;
    if (breakthrough.kind === 'none' || interval?.kind !== 'ok') throw new Error('no interval');
    expect(interval.breakthrough.least).toBeLessThan(breakthrough.value);
    expect(interval.breakthrough.most).toBeGreaterThan(breakthrough.value);
    expect(predictionSchema.parse(JSON.parse(JSON.stringify(fitted)))).toEqual(fitted);
    expect(predictionOf(judged).cold.interval).toBeNull();
  });

  test('is what the card says of the plate in hand too', () => {
    const card = cardEstimate({ ...judged, fit, thickness: 0.02 });
    expect(card.breakthrough).toBe(
      ((found) => (found.kind === 'ok' ? found.value : null))(predictionOf({ ...judged, fit }).cold.breakthrough),
    );
    expect(card.breakthrough).toBeLessThan(cardEstimate({ ...judged, thickness: 0.02 }).breakthrough ?? 0);
  });

  test('was not there when older revisions were stored: theirs is none', () => {
    const { interval, ...cold } = predictionOf(judged).cold;
    expect(interval).toBeNull();
    expect(predictionSchema.parse({ ...predictionOf(judged), cold }).cold.interval).toBeNull();
  });
});
