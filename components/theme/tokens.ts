/** The two palettes: drawing-office paper by day, the hall at night. Hex values stand here and nowhere else. */
export const light = {
  /** The page, and what lies on it. */
  ground: '#EDE8DC',
  sheet: '#FAF7F0',
  ink: '#1D2326',
  softInk: '#565D5A',
  /** Thin dividing lines; never the only thing that tells a control. */
  rule: '#CBC3B1',
  /** The one action that matters, loops, the chosen knot. */
  ember: '#B23815',
  emberDeep: '#96290A',
  onEmber: '#FFF8F0',
  /** Steel in section: its fill and the 45° hatch. */
  steelFill: '#D9D9D2',
  steelLine: '#8A938F',
  /** The cold plate's trace, the hot plate's trace (and caution), and what is in order. */
  cold: '#22566E',
  hot: '#8F430E',
  good: '#2A6436',
  /** Something is refused or broken. */
  wrong: '#A01B1F',
  /** Under a pointer, and behind a chosen row. */
  touched: '#E5DFD0',
  /** Behind a dialog. */
  veil: 'rgba(29, 35, 38, 0.55)',
} as const;

/** Typed by the light palette, so that a role forgotten here does not compile. */
export const night: Record<keyof typeof light, string> = {
  ground: '#14181A',
  sheet: '#1B2124',
  ink: '#ECE6D8',
  softInk: '#A8A699',
  rule: '#3A4246',
  ember: '#FF7A45',
  emberDeep: '#FF9466',
  onEmber: '#14181A',
  steelFill: '#2A3236',
  steelLine: '#66737A',
  cold: '#7FB4D1',
  hot: '#FFB26B',
  good: '#9CC29A',
  wrong: '#FF9D94',
  touched: '#262E32',
  veil: 'rgba(0, 0, 0, 0.65)',
};

export type Role = keyof typeof light;
export type ThemeName = 'light' | 'night';
export const palettes: Readonly<Record<ThemeName, Readonly<Record<Role, string>>>> = { light, night };
