/** Limits that form, schema, column and message read alike. */
export const limits = {
  /** Longest name of anything, characters: fits a title block on a phone. */
  name: 120,
  /** Longest free text (comments, report words), characters. */
  words: 4000,
  /** Longest note on a machine’s revision, characters. */
  note: 1000,
  mail: 254, // RFC 5321
  /** ASVS 6.2.1 asks 8 at least; bcrypt reads no more than 72 bytes. */
  passwordMin: 10,
  passwordMaxBytes: 72,
  /** Plate tag as painted or labelled. */
  tag: 40,
  /** Stages in one pierce. */
  stages: 20,
  /** A house rule's expression and its sentence, characters; and how many rules a plant keeps in force. */
  ruleExpression: 200,
  ruleSentence: 300,
  rules: 50,
  /** How a plant writes its currency, characters. */
  currency: 12,
  /** The plant's own lines before the blocks of a path, and those after them, characters. */
  blockLines: 2000,
  /** A drawing's file, bytes. */
  drawingBytes: 10 * 1024 * 1024,
  /** A photo as it comes from a phone, bytes. */
  photoBytes: 15 * 1024 * 1024,
  /** Longest side a stored photo keeps, px. */
  photoSide: 1600,
  /** Photos larger than this when decoded are refused, px. */
  photoPixels: 60_000_000,
  /** Pieces on one plate, and the contours and segments that they have in all. */
  placements: 500,
  layoutContours: 5_000,
  layoutSegments: 40_000,
  /** JSON bodies, bytes. */
  jsonBytes: 256 * 1024,
  /** Plate thickness the product takes, µm. */
  thicknessMin: 1_000,
  thicknessMax: 60_000,
  /** Rows a list answers with at most. */
  listRows: 500,
  /** A sign-in lasts, s: a working day. */
  sessionSeconds: 10 * 3600,
  /** Failed sign-ins in the window before an account or an address must wait. */
  signInFailuresByAccount: 8,
  signInFailuresByAddress: 40,
  signInWindowSeconds: 15 * 60,
  /** How long an answer is kept for a repeated Idempotency-Key, s. */
  idempotencySeconds: 48 * 3600,
} as const;
