import type { HouseRuleName, HouseRuleResults } from './names.ts';
import { isNumber, ruleUnderstood, valueOf, type Comparison, type Truth, type Value } from './understand.ts';

/** What a rule speaks of; or why it is none. */
export type HouseRuleRead =
  { readonly kind: 'ok'; readonly uses: readonly HouseRuleName[] } | { readonly kind: 'none'; readonly why: string };

/** Whether a rule holds; or why that cannot be said. */
export type HouseRuleHolds =
  { readonly kind: 'ok'; readonly holds: boolean } | { readonly kind: 'none'; readonly why: string };

/** Two sides that differ by rounding only are equal. */
const ROUNDING = 1e-12;

/**
 * The named results that a rule uses, when it is one: comparisons, arithmetic and logic over the names of `houseRuleTable`, numbers
 * and units, as in `reserveHot >= 2 and craterRadius <= 1.5 mm`. Units are checked: a length is compared with a length. Nothing
 * else is understood (no assignment, no call, no text, no list), and the answer then says what is in the way. Never throws.
 */
export function houseRuleRead(expression: string): HouseRuleRead {
  const rule = ruleOf(expression);
  if (rule.kind === 'none') return rule;
  return { kind: 'ok', uses: rule.uses };
}

/**
 * Whether a rule holds for the results. A result that does not exist makes no answer, unless the rest decides it: `reserveCold >= 2 or
 * thicknessMax < 6 mm` holds for thin plate, whatever the reserve. Two sides that differ by rounding count as equal. Never throws.
 */
export function houseRuleHolds(expression: string, results: HouseRuleResults): HouseRuleHolds {
  const rule = ruleOf(expression);
  if (rule.kind === 'none') return rule;
  const holds = truthOf(rule.truth, results);
  if (holds !== null) return { kind: 'ok', holds };
  const missing = rule.uses.filter((name) => !isNumber(results[name]));
  return { kind: 'none', why: `There is no ${missing.length === 0 ? 'finite number' : missing.join(', ')} here.` };
}

/**
 * How far results are from keeping a rule, without unit: 0 when it holds, else the part by which the nearest side misses, more for each
 * side that must give. What a search goes down, so the rule is read once. Infinite when it cannot be said.
 */
export function houseRuleMiss(expression: string): (results: HouseRuleResults) => number {
  const rule = ruleOf(expression);
  if (rule.kind === 'none') return () => Number.POSITIVE_INFINITY;
  return (results) => missOf(rule.truth, results, true);
}

type Rule =
  | { readonly kind: 'ok'; readonly truth: Truth; readonly uses: readonly HouseRuleName[] }
  | { readonly kind: 'none'; readonly why: string };

/** A rule that speaks of a pierce. */
function ruleOf(expression: string): Rule {
  const rule = ruleUnderstood(expression);
  if (rule.kind === 'none') return rule;
  const uses = new Set<HouseRuleName>();
  truthNames(rule.truth, uses);
  if (uses.size === 0) return { kind: 'none', why: 'The rule names no result, so it says nothing about a pierce.' };
  return { kind: 'ok', truth: rule.truth, uses: [...uses] };
}

function truthNames(truth: Truth, into: Set<HouseRuleName>): void {
  if (truth.do === 'not') return truthNames(truth.of, into);
  if (truth.do !== 'compare') {
    truthNames(truth.left, into);
    return truthNames(truth.right, into);
  }
  valueNames(truth.left, into);
  valueNames(truth.right, into);
}

function valueNames(value: Value, into: Set<HouseRuleName>): void {
  if (value.do === 'name') into.add(value.name);
  else if (value.do !== 'number') {
    valueNames(value.left, into);
    valueNames(value.right, into);
  }
}

/** True, false, or null for what cannot be said (Kleene's three values). */
function truthOf(truth: Truth, results: HouseRuleResults): boolean | null {
  if (truth.do === 'not') {
    const of = truthOf(truth.of, results);
    return of === null ? null : !of;
  }
  if (truth.do !== 'compare') {
    const decides = truth.do === 'or';
    const left = truthOf(truth.left, results);
    const right = truthOf(truth.right, results);
    if (left === decides || right === decides) return decides;
    return left === null || right === null ? null : !decides;
  }
  const left = valueOf(truth.left, results);
  const right = valueOf(truth.right, results);
  return left === null || right === null ? null : compared(truth.how, left, right);
}

function compared(comparison: Comparison, left: number, right: number): boolean {
  const same = Math.abs(left - right) <= ROUNDING * Math.max(Math.abs(left), Math.abs(right));
  switch (comparison) {
    case 'equal':
      return same;
    case 'unequal':
      return !same;
    case 'smaller':
      return !same && left < right;
    case 'smallerEq':
      return same || left < right;
    case 'larger':
      return !same && left > right;
    case 'largerEq':
      return same || left > right;
  }
}

/** `wanted` is what the part of the rule must come to: a `not` turns it round. */
function missOf(truth: Truth, results: HouseRuleResults, wanted: boolean): number {
  if (truth.do === 'not') return missOf(truth.of, results, !wanted);
  if (truth.do !== 'compare') {
    const left = missOf(truth.left, results, wanted);
    const right = missOf(truth.right, results, wanted);
    return (truth.do === 'and') === wanted ? left + right : Math.min(left, right);
  }
  const left = valueOf(truth.left, results);
  const right = valueOf(truth.right, results);
  if (left === null || right === null) return Number.POSITIVE_INFINITY;
  if (compared(truth.how, left, right) === wanted) return 0;
  const size = Math.max(Math.abs(left), Math.abs(right));
  // A side that only just misses, or two equal ones that should differ, still has to move.
  return Math.max(1e-9, size === 0 ? 0 : Math.abs(left - right) / size);
}
