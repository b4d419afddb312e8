import { create, parseDependencies, type MathNode } from 'mathjs/number';
import { quantityFrom, type Dimension } from '../units/index.ts';
import { kindJoined, kindName, kindOf, kindsEqual, PLAIN, type Kind } from './kind.ts';
import { houseRuleTable, type HouseRuleName, type HouseRuleResults } from './names.ts';

/** Longest rule, in characters. It bounds the work and how deep brackets go. */
export const LONGEST_RULE = 200;

export type RuleUnderstood =
  { readonly kind: 'ok'; readonly truth: Truth } | { readonly kind: 'none'; readonly why: string };

/** Units a rule may use, by how they are written in it. `degC` stands right behind a number: 200 degC. */
const UNITS: Readonly<Record<string, readonly [Dimension, string]>> = {
  mm: ['length', 'mm'],
  um: ['length', 'um'],
  cm: ['length', 'cm'],
  m: ['length', 'm'],
  in: ['length', 'in'],
  s: ['time', 's'],
  ms: ['time', 'ms'],
  min: ['time', 'min'],
  W: ['power', 'W'],
  kW: ['power', 'kW'],
  bar: ['pressure', 'bar'],
  mbar: ['pressure', 'mbar'],
  kPa: ['pressure', 'kPa'],
  psi: ['pressure', 'psi'],
  Hz: ['frequency', 'Hz'],
  kHz: ['frequency', 'kHz'],
  J: ['energy', 'J'],
  kJ: ['energy', 'kJ'],
  MJ: ['energy', 'MJ'],
  kg: ['mass', 'kg'],
  g: ['mass', 'g'],
  K: ['temperatureDifference', 'K'],
  degC: ['temperature', '°C'],
};

const ROWS: ReadonlyMap<string, { readonly name: HouseRuleName; readonly dimension: Dimension | 'count' }> = new Map(
  houseRuleTable.map((row) => [row.name, row]),
);

/** A rule understood: a tree of our own, so that nothing of the parser's is ever run. */
export type Value =
  | { readonly do: 'number'; readonly value: number }
  | { readonly do: 'name'; readonly name: HouseRuleName }
  | { readonly do: 'add' | 'subtract' | 'multiply' | 'divide'; readonly left: Value; readonly right: Value };
export type Comparison = 'smaller' | 'smallerEq' | 'larger' | 'largerEq' | 'equal' | 'unequal';
export type Truth =
  | { readonly do: 'compare'; readonly how: Comparison; readonly left: Value; readonly right: Value }
  | { readonly do: 'and' | 'or'; readonly left: Truth; readonly right: Truth }
  | { readonly do: 'not'; readonly of: Truth };
type Understood =
  | { readonly is: 'value'; readonly value: Value; readonly kind: Kind }
  | { readonly is: 'truth'; readonly truth: Truth };

/** Why a text is no rule; caught where the rule is read. */
class NoRule extends Error {}

const { parse } = create(parseDependencies ?? {}, {});

/** The tree of a rule; or why the text is none. Never throws. */
export function ruleUnderstood(expression: string): RuleUnderstood {
  if (typeof expression !== 'string' || expression.trim() === '') {
    return { kind: 'none', why: 'Type a comparison, such as reserveHot >= 2.' };
  }
  if (expression.length > LONGEST_RULE) {
    return { kind: 'none', why: `A rule has at most ${LONGEST_RULE} characters; this one has ${expression.length}.` };
  }
  const plain = expression
    .replace(/[≤⩽]/g, '<=')
    .replace(/[≥⩾]/g, '>=')
    .replace(/≠/g, '!=')
    .replace(/[−–]/g, '-')
    .replace(/[×·]/g, '*')
    .replace(/°C/g, 'degC');
  const odd = /[^A-Za-z0-9_ \t.+\-*/()<>=!%,]/.exec(plain);
  if (odd !== null) return { kind: 'none', why: `"${odd[0]}" has no meaning in a rule.` };
  let tree: MathNode;
  try {
    tree = parse(plain);
  } catch (error) {
    return { kind: 'none', why: `This cannot be read: ${error instanceof Error ? error.message : 'unknown'}.` };
  }
  try {
    const found = nodeRead(tree);
    if (found.is === 'truth') return { kind: 'ok', truth: found.truth };
    return {
      kind: 'none',
      why: `This is ${kindName(found.kind)} and no comparison: what must it be at least or at most?`,
    };
  } catch (error) {
    if (error instanceof NoRule) return { kind: 'none', why: error.message };
    throw error;
  }
}

const ARITHMETIC = ['add', 'subtract', 'multiply', 'divide'] as const;
const COMPARISONS = ['smaller', 'smallerEq', 'larger', 'largerEq', 'equal', 'unequal'] as const;
const LOGIC = ['and', 'or'] as const;

/** One node of the parser's tree, if it is of the few kinds that a rule is made of. */
function nodeRead(node: MathNode): Understood {
  switch (node.type) {
    case 'ParenthesisNode':
      return nodeRead(part(node, 'content'));
    case 'ConstantNode':
      return numberRead(Reflect.get(node, 'value'));
    case 'SymbolNode':
      return symbolRead(String(Reflect.get(node, 'name')));
    case 'RelationalNode':
      return chainRead(names(Reflect.get(node, 'conditionals')), parts(node, 'params'));
    case 'OperatorNode':
      return operatorRead(String(Reflect.get(node, 'fn')), parts(node, 'args'));
    default:
      throw new NoRule(
        `A rule is made of comparisons, + − * /, and, or, not; "${short(node.toString())}" is none of them.`,
      );
  }
}

function numberRead(value: unknown): Understood {
  if (typeof value !== 'number' || !Number.isFinite(value)) {
    throw new NoRule(`"${short(String(value))}" is no number that a rule can use.`);
  }
  return { is: 'value', value: { do: 'number', value }, kind: PLAIN };
}

function symbolRead(name: string): Understood {
  const row = ROWS.get(name);
  if (row !== undefined) return { is: 'value', value: { do: 'name', name: row.name }, kind: kindOf(row.dimension) };
  if (name === 'degC') throw new NoRule('degC stands right behind a number, as in 200 degC.');
  const unit = Object.hasOwn(UNITS, name) ? UNITS[name] : undefined;
  if (unit === undefined) throw new NoRule(`"${short(name)}" is no result and no unit that a rule knows.`);
  const [dimension, spelling] = unit;
  return {
    is: 'value',
    value: { do: 'number', value: quantityFrom(1, dimension, spelling) },
    kind: kindOf(dimension),
  };
}

/** Lower and upper at once: 2 <= reserveHot <= 4. */
function chainRead(conditionals: readonly string[], params: readonly MathNode[]): Understood {
  const links = conditionals.map((name, index) => {
    const [left, right] = [params[index], params[index + 1]];
    if (left === undefined || right === undefined) throw new NoRule('A comparison has two sides.');
    return operatorRead(name, [left, right]);
  });
  return links.reduce((left, right) => joined('and', left, right));
}

function operatorRead(name: string, args: readonly MathNode[]): Understood {
  const [first, second] = args;
  if (first === undefined || args.length > 2) throw new NoRule(`"${short(name)}" has no meaning in a rule.`);
  if (second === undefined) return unaryRead(name, nodeRead(first));
  const celsius = name === 'multiply' ? celsiusRead(first, second) : undefined;
  if (celsius !== undefined) return celsius;
  const left = nodeRead(first);
  const right = nodeRead(second);

  const logic = LOGIC.find((known) => known === name);
  if (logic !== undefined) return joined(logic, left, right);
  if (left.is === 'truth' || right.is === 'truth') throw new NoRule('Comparisons are joined with and, or, not.');

  const comparison = COMPARISONS.find((known) => known === name);
  const arithmetic = ARITHMETIC.find((known) => known === name);
  if (arithmetic === 'multiply' || arithmetic === 'divide') {
    const kind = kindJoined(left.kind, right.kind, arithmetic === 'multiply' ? 1 : -1);
    return { is: 'value', value: { do: arithmetic, left: left.value, right: right.value }, kind };
  }
  if (comparison === undefined && arithmetic === undefined) {
    throw new NoRule(`"${short(name)}" has no meaning in a rule: use comparisons, + − * /, and, or, not.`);
  }
  if (!kindsEqual(left.kind, right.kind)) {
    throw new NoRule(
      `The two sides do not fit: ${kindName(left.kind)} and ${kindName(right.kind)}. Is a unit missing or wrong?`,
    );
  }
  if (comparison !== undefined) {
    return { is: 'truth', truth: { do: 'compare', how: comparison, left: left.value, right: right.value } };
  }
  return { is: 'value', value: { do: arithmetic ?? 'add', left: left.value, right: right.value }, kind: left.kind };
}

function unaryRead(name: string, of: Understood): Understood {
  if (name === 'not' && of.is === 'truth') return { is: 'truth', truth: { do: 'not', of: of.truth } };
  if (name === 'not') throw new NoRule('not stands before a comparison in brackets.');
  if (of.is === 'truth') throw new NoRule('Comparisons are joined with and, or, not.');
  if (name === 'unaryPlus') return of;
  if (name !== 'unaryMinus') throw new NoRule(`"${short(name)}" has no meaning in a rule.`);
  const zero: Value = { do: 'number', value: 0 };
  return { is: 'value', value: { do: 'subtract', left: zero, right: of.value }, kind: of.kind };
}

/** 200 degC or −10 degC: the one unit with a shift, so it is no factor. */
function celsiusRead(number: MathNode, unit: MathNode): Understood | undefined {
  if (unit.type !== 'SymbolNode' || Reflect.get(unit, 'name') !== 'degC') return undefined;
  const found = nodeRead(number);
  if (found.is === 'truth' || !kindsEqual(found.kind, PLAIN)) throw new NoRule('degC stands right behind a number.');
  const celsius = valueOf(found.value, null);
  if (celsius === null) throw new NoRule('degC stands right behind a number.');
  return {
    is: 'value',
    value: { do: 'number', value: quantityFrom(celsius, 'temperature', '°C') },
    kind: kindOf('temperature'),
  };
}

function joined(how: 'and' | 'or', left: Understood, right: Understood): Understood {
  if (left.is === 'value' || right.is === 'value') throw new NoRule(`${how} stands between two comparisons.`);
  return { is: 'truth', truth: { do: how, left: left.truth, right: right.truth } };
}

/** A child of a node; what is no node has no meaning. */
function part(node: MathNode, name: string): MathNode {
  return asNode(Reflect.get(node, name));
}

function parts(node: MathNode, name: string): readonly MathNode[] {
  const all: unknown = Reflect.get(node, name);
  return Array.isArray(all) ? all.map(asNode) : [];
}

function asNode(value: unknown): MathNode {
  // The parser made the tree, and its nodes say so of themselves.
  if (typeof value === 'object' && value !== null && Reflect.get(value, 'isNode') === true) return value as MathNode;
  throw new NoRule('This cannot be read.');
}

function names(value: unknown): readonly string[] {
  return Array.isArray(value) ? value.map(String) : [];
}

function short(text: string): string {
  return text.length > 30 ? `${text.slice(0, 30)}…` : text;
}

/** Null for what does not exist or is not finite, such as a quotient by zero. */
export function valueOf(value: Value, results: HouseRuleResults | null): number | null {
  if (value.do === 'number') return value.value;
  if (value.do === 'name') {
    const found = results?.[value.name];
    return isNumber(found) ? found : null;
  }
  const left = valueOf(value.left, results);
  const right = valueOf(value.right, results);
  if (left === null || right === null) return null;
  const found = calculated(value.do, left, right);
  return Number.isFinite(found) ? found : null;
}

function calculated(how: (typeof ARITHMETIC)[number], left: number, right: number): number {
  if (how === 'add') return left + right;
  if (how === 'subtract') return left - right;
  return how === 'multiply' ? left * right : left / right;
}

export function isNumber(value: unknown): value is number {
  return typeof value === 'number' && Number.isFinite(value);
}
