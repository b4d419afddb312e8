import { z } from 'zod';
import type { Rates } from '../strategy/estimate/money.ts';
import { instantSchema, personSchema, quantity, versionSchema } from './basics.ts';
import { endpoint } from './endpoint.ts';
import { limits } from './limits.ts';

const amount = quantity(0, 1e9, '0 to 1 000 000 000').nullable();

const ratesShape = {
  /** As the plant writes it; empty only where no rate is given. */
  currency: z.string().trim().max(limits.currency, `At most ${limits.currency} characters.`),
  /** For an hour of the machine, a kg of oxygen and a kWh; null where the plant gives none. */
  machineHour: amount,
  oxygenKilogram: amount,
  electricityKilowattHour: amount,
  /** Light out of the laser over electrical energy into it. */
  wallPlugEfficiency: quantity(0.01, 1, '1 to 100 %'),
};

type Amounts = Pick<Rates, 'machineHour' | 'oxygenKilogram' | 'electricityKilowattHour'>;

/** Whether anything can be said in money. */
export const givesRates = ({ machineHour, oxygenKilogram, electricityKilowattHour }: Amounts): boolean =>
  machineHour !== null || oxygenKilogram !== null || electricityKilowattHour !== null;

/** What a lead writes. */
export const ratesFormSchema = z
  .strictObject(ratesShape)
  .refine((rates) => rates.currency !== '' || !givesRates(rates), {
    path: ['currency'],
    error: 'Say in which currency, as in EUR.',
  }) satisfies z.ZodType<Rates>;
export type RatesForm = z.output<typeof ratesFormSchema>;

export const plantRatesSchema = z.object({
  ...ratesShape,
  version: versionSchema,
  changedAt: instantSchema,
  /** Null while nobody has written any. */
  changedBy: personSchema.nullable(),
});
export type PlantRates = z.infer<typeof plantRatesSchema>;

export const rateEndpoints = {
  get: endpoint({
    method: 'GET',
    path: '/api/rates',
    summary: 'What the plant pays for an hour, oxygen and energy',
    access: 'rate.read',
    answer: plantRatesSchema,
  }),
  change: endpoint({
    method: 'PUT',
    path: '/api/rates',
    summary: 'Write what the plant pays; estimates say money with it from then on',
    access: 'rate.write',
    body: ratesFormSchema,
    answer: plantRatesSchema,
    ifMatch: true,
  }),
};
