import type { Card } from '@/shared/cards.ts';

/** A plate card without an approved strategy: the least that the schema takes. */
export const cardOf = (more: Partial<Card> = {}): Card => ({
  asOf: '2031-03-03T14:02:00Z',
  machine: { id: '019a0000-0000-7000-8000-000000000003', name: 'No. 2' },
  plate: null,
  gradeGroup: 'S355',
  nominalThickness: 20_000,
  match: { kind: 'none', why: 'No approved strategy covers 20 mm of S355 on No. 2.', requested: false },
  ...more,
});
