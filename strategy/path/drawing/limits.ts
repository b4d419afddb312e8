/** What a drawing may be at most; beyond it is refused before it costs anything. */
export const drawingLimits = {
  /** 10 MiB. */
  bytes: 10 * 1024 * 1024,
  /** Pieces of geometry after all inserts are resolved. */
  entities: 200_000,
  /** Blocks within blocks. */
  insertDepth: 16,
  /** Control points or vertices of one entity. */
  points: 100_000,
  splineDegree: 25,
  /** Lines and arcs all curves together may become. */
  segments: 300_000,
  /** Closed contours, of which each is compared with all around it. */
  contours: 30_000,
  /** Farthest place from the origin, m. */
  reach: 1e4,
  /** Largest number of any kind in the file's own units: a hundred times the reach in micrometres. */
  number: 1e12,
} as const;
