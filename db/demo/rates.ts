import type { RatesForm } from '../../shared/rates.ts';

/** What the demo plants pay; the second gives no rates, so that estimates without money can be seen. Invented. */
export const demoRates: Readonly<Record<'quay' | 'upland', RatesForm | null>> = {
  quay: {
    currency: 'EUR',
    machineHour: 135,
    oxygenKilogram: 0.28,
    electricityKilowattHour: 0.24,
    wallPlugEfficiency: 0.35,
  },
  upland: null,
};
