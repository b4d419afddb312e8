import { demoId } from './ids.ts';
import { demoStrategies } from './strategies.ts';

const part = (name: string, file: string) => ({ id: demoId(`quay part ${name}`), name, file });

/** Our own drawings, in drawings/. */
export const demoParts = {
  bracket: part('Slew-ring bracket', 'slew-ring-bracket.dxf'),
  lug: part('Lifting lug', 'lifting-lug.dxf'),
  bearing: part('Bearing plate', 'bearing-plate.dxf'),
  bollard: part('Bollard base', 'bollard-base.dxf'),
};

export type DemoCornerPlan = {
  readonly id: string;
  readonly partId: string;
  readonly revisionId: string;
  readonly thickness: number; // m
  readonly plateTemperature: number; // K
  /** Free skeleton on every side, m. */
  readonly skeleton: number;
};

const skeleton = 0.025;

/** The revision of a demo strategy that is approved. */
export function approvedDemoRevision(name: string): string {
  const revisions = demoStrategies().quay.find((strategy) => strategy.name === name)?.revisions ?? [];
  const last = revisions.filter(({ fate }) => fate.approve).at(-1);
  if (!last) throw new RangeError(`no demo strategy ${name} is approved`);
  return last.id;
}

export function demoCornerPlans(): readonly DemoCornerPlan[] {
  const plan = (of: { id: string; name: string }, strategy: string, thickness: number, plateTemperature: number) => ({
    id: demoId(`quay plan ${of.name} ${strategy}`),
    partId: of.id,
    revisionId: approvedDemoRevision(strategy),
    thickness,
    plateTemperature,
    skeleton,
  });
  return [
    plan(demoParts.lug, 'Lifting lugs 25', 0.025, 333.15),
    plan(demoParts.bearing, 'Bearing plates 20, No. 1', 0.02, 313.15),
    plan(demoParts.bracket, 'Bearing plates 20, No. 2', 0.02, 333.15),
  ];
}
