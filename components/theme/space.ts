/** Distances, px. */
export const space = { hair: 2, xs: 4, s: 8, m: 12, l: 16, xl: 24, xxl: 40 } as const;

/** Lines of the drawing office, px. */
export const line = { thin: 1, rule: 1, outline: 2.4, corner: 3 } as const;

/** Least height of what is touched, px: anything, an operator's main action, the three that matter on a plate. */
export const touch = { least: 48, operator: 64, gloved: 96 } as const;

/** Width from which a page has a side rail and more than one pane, px. */
export const wideFrom = 1000;
