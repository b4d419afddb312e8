import { cardEndpoints, requestEndpoints } from './cards.ts';
import { cornerPlanEndpoints } from './corner-plans.ts';
import type { Endpoint } from './endpoint.ts';
import { estimateEndpoints } from './estimates.ts';
import { houseRuleEndpoints } from './house-rules.ts';
import { layoutEndpoints } from './layouts.ts';
import { gradeEndpoints, machineEndpoints, nozzleEndpoints } from './machines.ts';
import { partEndpoints } from './parts.ts';
import { peopleEndpoints } from './people.ts';
import { plateEndpoints } from './plates.ts';
import { healthEndpoints, recordEndpoints } from './record.ts';
import { rateEndpoints } from './rates.ts';
import { reportEndpoints } from './reports.ts';
import { sessionEndpoints } from './sessions.ts';
import { reviewEndpoints, revisionEndpoints, strategyEndpoints } from './strategies.ts';
import { blockFrameEndpoints, cutPathEndpoints } from './take-away.ts';

/** Every endpoint by name, for the description and the tests that walk them all. Screens import their own noun instead. */
export const endpoints: Readonly<Record<string, Endpoint>> = Object.fromEntries(
  Object.entries({
    session: sessionEndpoints,
    person: peopleEndpoints,
    machine: machineEndpoints,
    nozzle: nozzleEndpoints,
    grade: gradeEndpoints,
    strategy: strategyEndpoints,
    revision: revisionEndpoints,
    review: reviewEndpoints,
    houseRule: houseRuleEndpoints,
    rate: rateEndpoints,
    plate: plateEndpoints,
    card: cardEndpoints,
    request: requestEndpoints,
    part: partEndpoints,
    layout: layoutEndpoints,
    cornerPlan: cornerPlanEndpoints,
    estimate: estimateEndpoints,
    cutPath: cutPathEndpoints,
    blockFrame: blockFrameEndpoints,
    report: reportEndpoints,
    record: recordEndpoints,
    service: healthEndpoints,
  }).flatMap(([noun, group]) => Object.entries(group).map(([name, one]) => [`${noun}.${name}`, one as Endpoint])), // each group's endpoints are narrower
);
