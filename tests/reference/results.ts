import fs from 'node:fs';
import path from 'node:path';
import { cornerSet, type SetCase } from './corners.ts';
import { type CornerResult, solveCorner, solverVersion } from './solve.ts';

/** What is kept of one case. Rises in K over the plate temperature, lengths in m, times in s. */
export type KeptResult = {
  readonly name: string;
  readonly returnRise: number;
  /** By how much halving all lengths and times moved it, relative. */
  readonly halving: number;
  /** Wished edge near the corner with which it was found, m. */
  readonly finest: number;
  /** The same with the last 2 mm of path counted. */
  readonly wholeRise: number;
  readonly peaks: CornerResult['peaks'];
  readonly balance: number;
  readonly nodes: number;
  /** How long the solver took, s; not compared with anything. */
  readonly seconds: number;
};

export type KeptResults = { readonly solver: number; readonly results: readonly KeptResult[] };

const file = path.join(import.meta.dirname, 'results.json');

export function keptResults(): KeptResults {
  // written by writeResults below
  return JSON.parse(fs.readFileSync(file, 'utf8')) as KeptResults;
}

export function writeResults(results: readonly KeptResult[]): void {
  const kept: KeptResults = { solver: solverVersion, results };
  fs.writeFileSync(file, `${JSON.stringify(kept, null, 2)}\n`);
}

/** The edge near the corner that a case is begun with, m. */
export const firstFinest = 0.2e-3;

/** Halvings of it that are tried at most until the last moves the return rise by less than 1 %. */
const mostHalvings = 2;

const digits = (value: number): number => Number(value.toPrecision(7));

/** Solves a case finer and finer until halving moves its return rise by less than 1 %. */
export function resultOf(one: SetCase): KeptResult {
  const properties = one.standard ? { properties: 'standard' as const } : {};
  let before = solveCorner(one, { finest: firstFinest, ...properties }).returnRise;
  for (let halvings = 1; ; halvings++) {
    const finest = firstFinest / 2 ** halvings;
    const start = performance.now();
    const found = solveCorner(one, { finest, history: halvings === 1, ...properties });
    const seconds = (performance.now() - start) / 1000;
    const halving = Math.abs(found.returnRise - before) / found.returnRise;
    if (halving < 0.01 || halvings === mostHalvings) {
      const result = halvings === 1 ? found : solveCorner(one, { finest, history: true, ...properties });
      return {
        name: one.name,
        returnRise: digits(result.returnRise),
        halving: Number(halving.toPrecision(2)),
        finest,
        wholeRise: digits(result.wholeRise),
        peaks: result.peaks.map(({ depth, before: at, rise, time }) => ({
          depth,
          before: digits(at),
          rise: digits(rise),
          time: digits(time),
        })),
        balance: Number(result.balance.toFixed(9)),
        nodes: result.nodes,
        seconds: Number(seconds.toFixed(1)),
      };
    }
    before = found.returnRise;
  }
}

/** The set with what was kept of each case. */
export function setWithResults(): { one: SetCase; kept: KeptResult }[] {
  const byName = new Map(keptResults().results.map((r) => [r.name, r]));
  return cornerSet().flatMap((one) => {
    const kept = byName.get(one.name);
    return kept ? [{ one, kept }] : [];
  });
}
