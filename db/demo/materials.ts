import type { z } from 'zod';
import type { plateFormSchema } from '../../shared/plates.ts';
import { demoId } from './ids.ts';

/** Grades of EN 10025-2, with the groups these plants make strategies for. */
const gradesByGroup = {
  S235: ['S235JR', 'S235J2'],
  S275: ['S275JR', 'S275J0', 'S275J2'],
  S355: ['S355JR', 'S355J0', 'S355J2', 'S355K2'],
} as const;

export const demoGrades = (plant: string) =>
  Object.entries(gradesByGroup).flatMap(([group, names]) =>
    names.map((name) => ({ id: demoId(`${plant} grade ${name}`), name, group })),
  );

export const demoNozzles = (plant: string) => [
  { id: demoId(`${plant} nozzle single 1.5`), name: 'Single 1.5', type: 'single' as const, diameter: 0.0015 },
  { id: demoId(`${plant} nozzle double 1.5`), name: 'Double 1.5', type: 'double' as const, diameter: 0.0015 },
  { id: demoId(`${plant} nozzle double 2.0`), name: 'Double 2.0', type: 'double' as const, diameter: 0.002 },
];

type PlateForm = z.output<typeof plateFormSchema>;

const plate = (
  plant: string,
  tag: string,
  grade: string,
  nominal: number,
  rest: Partial<PlateForm> = {},
): PlateForm & { id: string } => ({
  id: demoId(`${plant} plate ${tag}`),
  tag,
  gradeId: demoId(`${plant} grade ${grade}`),
  heatNumber: '',
  nominalThickness: nominal * 1000,
  measuredThickness: null,
  surface: 'mill scale',
  certificate: '',
  length: 3,
  width: 1.5,
  ...rest,
});

export const demoPlates = {
  quay: [
    plate('quay', 'Q-1207', 'S275JR', 12, { heatNumber: '4410-7', measuredThickness: 12_100 }),
    plate('quay', 'Q-1511', 'S275J2', 15, { heatNumber: '4433-1', certificate: '3.1, folder 26/114' }),
    plate('quay', 'Q-2003', 'S275JR', 20, { heatNumber: '4471-2', measuredThickness: 20_200 }),
    // Measured well over its nominal thickness: the card says so before the numbers.
    plate('quay', 'Q-2004', 'S275JR', 20, { heatNumber: '4471-2', measuredThickness: 21_300, surface: 'rust' }),
    plate('quay', 'Q-2018', 'S355J2', 20, {
      heatNumber: '5092-4',
      certificate: '3.1, folder 26/131',
      length: 4,
      width: 2,
    }),
    plate('quay', 'Q-2502', 'S355J2', 25, { heatNumber: '5103-1', measuredThickness: 25_100, length: 4, width: 2 }),
    plate('quay', 'Q-2509', 'S355K2', 25, { heatNumber: '5103-9', surface: 'primer', length: 4, width: 2 }),
    // No strategy is approved for it yet.
    plate('quay', 'Q-3001', 'S355J2', 30, { heatNumber: '5120-3', length: 4, width: 2 }),
  ],
  upland: [
    plate('upland', 'U-15-1', 'S275JR', 15, { heatNumber: '88-2' }),
    plate('upland', 'U-20-1', 'S355JR', 20, { heatNumber: '91-5', surface: 'rust' }),
  ],
};
