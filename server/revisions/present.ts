import type { Person } from '../../shared/basics.ts';
import type { HouseRuleVerdict } from '../../shared/house-rules.ts';
import type { Revision } from '../../shared/strategies.ts';
import type { WholeRevision } from './repository.ts';

export function presentRevision(
  { revision, strategyName, machine, nozzle, authors, reviews }: WholeRevision,
  names: (userId: string) => Person,
  houseRules: readonly HouseRuleVerdict[],
): Revision {
  return {
    id: revision.id,
    version: revision.version,
    strategyId: revision.strategyId,
    strategyName,
    number: revision.number,
    state: revision.state,
    content: revision.content,
    prediction: revision.prediction,
    houseRules: [...houseRules],
    machine: { id: machine.id, name: machine.name, revisionNumber: machine.revisionNumber },
    nozzle: { id: nozzle.id, name: nozzle.name, type: nozzle.type, diameter: nozzle.diameter },
    touchedBy: authors.map(names),
    changedAt: revision.changedAt.toISOString(),
    reviews: reviews.map(({ id, verdict, by, at, words }) => ({
      id,
      verdict,
      by: names(by),
      at: at.toISOString(),
      words,
    })),
  };
}
