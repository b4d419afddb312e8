import type { PlateProperties } from '../heat/properties.ts';
import type { MachineProfile } from '../machine.ts';
import type { Contour } from '../path/contour.ts';
import type { Corner } from '../path/corner.ts';
import type { Loop, LoopCorner } from '../path/loop.ts';
import type { ObstacleField } from '../path/loop-fit.ts';
import type { Box, Point } from '../path/point.ts';
import type { Segment } from '../path/segment.ts';
import type { CornerRules, CutConditions } from './rules.ts';

export type CornerTreatment = 'loop' | 'dwell' | 'leave';

/** A finished contour of the plan: outer contours and islands counter-clockwise, holes clockwise. */
export type PlanContour = {
  readonly id: string;
  readonly contour: Contour;
  readonly role: 'outer' | 'hole' | 'island';
};

export type CornerPlanRequest = {
  readonly contours: readonly PlanContour[];
  /** The plate's outline, m, or null when loops need not keep to one. */
  readonly plate: { readonly min: Point; readonly max: Point } | Contour | null;
  readonly rules: CornerRules;
  readonly cut: CutConditions;
  readonly profile: Pick<MachineProfile, 'axes' | 'smallestArc'>;
  readonly thickness: number; // m
  readonly plateTemperature: number; // K
  readonly properties?: PlateProperties;
  /** Treatments the programmer asked for, by corner id. */
  readonly overrides?: Readonly<Record<string, CornerTreatment>>;
};

/** What one treatment would give at a corner. */
export type CornerOption = {
  readonly treatment: CornerTreatment;
  readonly fits: boolean;
  readonly returnWith: number | null; // K; null when it does not fit
  readonly addedTime: number | null; // s
  readonly why: string;
  /** Where the thing in the way is, m. */
  readonly at?: Point;
};

/** What all corners of a plan share; loops placed so far are obstacles to the next. */
export type Context = {
  readonly request: CornerPlanRequest;
  readonly field: ObstacleField;
  readonly plate: Box | Contour | null;
  readonly straightEdge: number;
  /** What the straight edge and the excess allowed make, K. */
  readonly limit: number;
  readonly placed: { name: string; loop: Loop }[];
};

/** What is known of a corner before anything is decided. */
export type Case = {
  readonly id: string;
  readonly contourId: string;
  readonly corner: Corner;
  readonly onPath: LoopCorner;
  readonly before: readonly Segment[];
  readonly without: number; // K
};

/** An option with what it would put on the plate. */
export type Candidate = CornerOption & { readonly loop?: Loop; readonly dwell?: number };
