// `npm run reference`: solves the whole set and writes results.json; with `--missing` only what is not there yet, with words only the cases whose names hold
// one of them. `npm run reference -- --errors` solves nothing and prints how far the quick model is from the results.
import { cornerSet } from './corners.ts';
import { errorTable } from './errors.ts';
import { type KeptResult, keptResults, resultOf, writeResults } from './results.ts';
import { solverVersion } from './solve.ts';

const asked = process.argv.slice(2);
const words = asked.filter((word) => !word.startsWith('--'));
if (asked.includes('--errors')) {
  console.log(errorTable());
} else {
  const set = cornerSet();
  const old = new Map<string, KeptResult>();
  try {
    const kept = keptResults();
    if (kept.solver === solverVersion) for (const result of kept.results) old.set(result.name, result);
  } catch {
    console.log('No earlier results.');
  }
  for (const one of set) {
    const named = words.length === 0 || words.some((word) => one.name.includes(word));
    if (!named || (asked.includes('--missing') && old.has(one.name))) continue;
    const result = resultOf(one);
    old.set(one.name, result);
    console.log(
      `${one.name}: ${result.returnRise.toFixed(2)} K, halving moved it by ${(100 * result.halving).toFixed(2)} %, ` +
        `balance ${result.balance.toFixed(6)}, ${result.nodes} nodes, ${result.seconds} s`,
    );
    // after each, so that a break loses one case only
    writeResults(set.flatMap((s) => old.get(s.name) ?? []));
  }
}
