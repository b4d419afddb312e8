import { and, desc, eq, lt, ne } from 'drizzle-orm';
import { inPlant, type Transaction } from '../../db/database.ts';
import { machineRevisions } from '../../db/schema/machine-revisions.ts';
import { strategyRevisions } from '../../db/schema/strategy-revisions.ts';
import { estimateEndpoints } from '../../shared/estimates.ts';
import { givesRates } from '../../shared/rates.ts';
import { notFound } from '../errors.ts';
import { findNozzle } from '../nozzles/routes.ts';
import { findRates } from '../rates/repository.ts';
import type { Mount } from '../route.ts';
import type { EstimateAsked, RevisionOn } from './estimate.ts';
import { findCornerPlan } from './repository.ts';

export function estimateRoutes({ route, services }: Mount): void {
  // Four plans with their paths and plates take seconds: not while a transaction is open.
  route(
    estimateEndpoints.plan,
    async ({ actor, params }) => {
      const asked = await inPlant(services.database, actor.plantId, (tx) => askedOf(tx, params.planId), 'read');
      return { value: await services.drawings.estimate(asked) };
    },
    async ({ prepared }) => ({ body: prepared }),
  );
}

async function askedOf(tx: Transaction, planId: string): Promise<EstimateAsked> {
  const found = await findCornerPlan(tx, planId);
  if (!found) throw notFound('There is no such corner plan');
  const { plan, planned, revision, profile } = found;
  const { version, thickness, plateTemperature, overrides, limit, corners } = plan;
  const own = await runsOn(tx, { revision, profile });
  if (!own) throw new Error(`corner plan ${planId} is for a nozzle that is not there`);
  const { currency, machineHour, oxygenKilogram, electricityKilowattHour, wallPlugEfficiency } = await findRates(tx);
  const rates = { currency, machineHour, oxygenKilogram, electricityKilowattHour, wallPlugEfficiency };
  return {
    planned,
    plan: { version, thickness, plateTemperature, overrides, limit, corners },
    own,
    previous: await revisionBefore(tx, revision),
    rates: givesRates(rates) ? rates : null,
  };
}

type Found = {
  readonly revision: typeof strategyRevisions.$inferSelect;
  readonly profile: typeof machineRevisions.$inferSelect.profile;
};

async function runsOn(tx: Transaction, { revision, profile }: Found): Promise<RevisionOn | null> {
  const { number, content, prediction } = revision;
  const nozzle = await findNozzle(tx, content.nozzleId);
  return nozzle && { number, content, prediction, profile, nozzle };
}

/** The revision before of the same strategy that was handed in; null when this is the first. */
async function revisionBefore(tx: Transaction, { strategyId, number }: Found['revision']): Promise<RevisionOn | null> {
  const [before] = await tx
    .select({ revision: strategyRevisions, profile: machineRevisions.profile })
    .from(strategyRevisions)
    .innerJoin(machineRevisions, eq(machineRevisions.id, strategyRevisions.machineRevisionId))
    .where(
      and(
        eq(strategyRevisions.strategyId, strategyId),
        lt(strategyRevisions.number, number),
        ne(strategyRevisions.state, 'draft'),
      ),
    )
    .orderBy(desc(strategyRevisions.number))
    .limit(1);
  return before ? runsOn(tx, before) : null;
}
