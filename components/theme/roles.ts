import type { Role } from './tokens.ts';

const variable = <R extends Role>(role: R) => `var(--${role})` as const;

/** Colours by what they are for, as CSS variables: the exported page is neutral and the browser fills them in. */
export const roles: Readonly<Record<Role, `var(--${Role})`>> = {
  ground: variable('ground'),
  sheet: variable('sheet'),
  ink: variable('ink'),
  softInk: variable('softInk'),
  rule: variable('rule'),
  ember: variable('ember'),
  emberDeep: variable('emberDeep'),
  onEmber: variable('onEmber'),
  steelFill: variable('steelFill'),
  steelLine: variable('steelLine'),
  cold: variable('cold'),
  hot: variable('hot'),
  good: variable('good'),
  wrong: variable('wrong'),
  touched: variable('touched'),
  veil: variable('veil'),
};
