import { demoId } from './ids.ts';

type DemoRule = {
  readonly id: string;
  readonly expression: string;
  readonly sentence: string;
  readonly blocks: boolean;
};

/** What the demo plants ask of a pierce beside the two rules on the reserve that every plant begins with. Limits are invented. */
export const demoHouseRules: Readonly<Record<'quay' | 'upland', readonly DemoRule[]>> = {
  quay: [
    {
      id: demoId('quay house rule crater'),
      expression: 'craterRadius <= 1.5 mm',
      sentence: 'The crater stays within 1.5 mm of the hole’s middle, so that a short lead-in clears it.',
      blocks: true,
    },
    {
      id: demoId('quay house rule routine'),
      expression: 'routineTime <= 25 s',
      sentence: 'A pierce takes 25 s at most; a longer one is talked over first.',
      blocks: false,
    },
  ],
  upland: [],
};
