import type { Transaction } from '../../db/database.ts';
import { predictionOf, reserveRulesOf, type Judged } from '../../shared/prediction.ts';
import type { Prediction, StrategyContent } from '../../shared/strategies.ts';
import { AppError } from '../errors.ts';
import { rulesInForce } from '../house-rules/repository.ts';
import { findMachineRevision } from '../machines/repository.ts';
import { findNozzle } from '../nozzles/routes.ts';
import { contentColumns } from './repository.ts';

/** A content's columns with the prediction the server computes for it; 400 as `groundOf`. */
export async function judged(tx: Transaction, content: StrategyContent): Promise<ReturnType<typeof contentColumns>> {
  const { machineId, ...given } = await groundOf(tx, content);
  const expressions = (await rulesInForce(tx)).map(({ expression }) => expression);
  return contentColumns(content, machineId, predicted(given, expressions));
}

/** What a content is judged on; 400 when it names a machine or nozzle that isn't here. */
export async function groundOf(
  tx: Transaction,
  content: StrategyContent,
): Promise<Judged & { readonly machineId: string }> {
  const machine = await findMachineRevision(tx, content.machineRevisionId);
  const nozzle = await findNozzle(tx, content.nozzleId);
  const errors = [
    ...(machine ? [] : [{ pointer: '/content/machineRevisionId', detail: 'Choose a machine of this plant.' }]),
    ...(nozzle ? [] : [{ pointer: '/content/nozzleId', detail: 'Choose a nozzle of this plant.' }]),
  ];
  if (!machine || !nozzle) throw new AppError('invalid-fields', errors[0]?.detail ?? '', { errors });
  return {
    content,
    machineId: machine.machineId,
    profile: machine.profile,
    nozzle: { type: nozzle.type, diameter: nozzle.diameter },
  };
}

/** The model refuses what it can't follow with a RangeError that says why: then the content is at fault, not the server. */
function predicted(given: Judged, expressions: readonly string[]): Prediction {
  try {
    return predictionOf(given, reserveRulesOf(expressions));
  } catch (error) {
    if (!(error instanceof RangeError)) throw error;
    const detail = `The model can’t follow this pierce: ${error.message}.`;
    throw new AppError('invalid-fields', detail, { errors: [{ pointer: '/content', detail }] });
  }
}
