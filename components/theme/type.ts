const fallback = 'system-ui, sans-serif';

/** The families, one a weight, as `fonts.ts` loads them. */
export const family = {
  reading: `Barlow-Regular, ${fallback}`,
  readingMedium: `Barlow-Medium, ${fallback}`,
  readingStrong: `Barlow-SemiBold, ${fallback}`,
  label: `BarlowCondensed-Medium, ${fallback}`,
  figure: `BarlowCondensed-SemiBold, ${fallback}`,
} as const;

/** Sizes in px with their line heights. Nothing below 14. */
export const size = {
  label: { fontSize: 14, lineHeight: 18 },
  labelLarge: { fontSize: 18, lineHeight: 23 },
  small: { fontSize: 15, lineHeight: 21 },
  body: { fontSize: 17, lineHeight: 25 },
  bodyLarge: { fontSize: 19, lineHeight: 27 },
  heading3: { fontSize: 20, lineHeight: 25 },
  heading2: { fontSize: 24, lineHeight: 29 },
  heading1: { fontSize: 32, lineHeight: 36 },
  figureSmall: { fontSize: 16, lineHeight: 20 },
  figure: { fontSize: 22, lineHeight: 27 },
  figureLarge: { fontSize: 28, lineHeight: 33 },
} as const;

export const type = { family, size } as const;
