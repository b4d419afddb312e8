import type { PlateProperties } from '../heat/properties.ts';
import type { ReturnQuestion } from '../heat/return-temperature.ts';
import type { MachineProfile } from '../machine.ts';
import type { Contour } from '../path/contour.ts';
import type { Corner } from '../path/corner.ts';
import type { EasedPiece } from '../path/ease.ts';
import type { Loop, LoopCorner } from '../path/loop.ts';
import type { PlacedLoop } from '../path/loop-fit.ts';
import type { FieldLeadIn, FieldPlate, ObstacleField } from '../path/obstacles.ts';
import type { Point } from '../path/point.ts';
import type { CornerRound } from '../path/round.ts';
import type { Segment } from '../path/segment.ts';
import type { CornerRules, CutConditions } from './rules.ts';

export type CornerTreatment = 'loop' | 'dwell' | 'ease' | 'round' | 'leave';

/** A finished contour of the plan: outer contours and islands counter-clockwise, holes clockwise. */
export type PlanContour = {
  readonly id: string;
  readonly contour: Contour;
  readonly role: 'outer' | 'hole' | 'island';
  /** As a sentence calls it: "hole 2 of part 3"; its role and id when left out. */
  readonly name?: string;
};

export type CornerPlanRequest = {
  /** In the order of cutting: what lies within a contour that is cut before has dropped out. */
  readonly contours: readonly PlanContour[];
  /** What there is to cut from, m, or null when loops need not keep to it. */
  readonly plate: { readonly min: Point; readonly max: Point } | Exclude<FieldPlate, { minX: number }> | null;
  /** How cuts begin, where that is settled: loops keep clear of lead-ins and craters. */
  readonly leadIns?: readonly FieldLeadIn[];
  readonly rules: CornerRules;
  readonly cut: CutConditions;
  readonly profile: Pick<MachineProfile, 'axes' | 'smallestArc'>;
  readonly thickness: number; // m
  readonly plateTemperature: number; // K
  readonly properties?: PlateProperties;
  /** Treatments the programmer asked for, by corner id. */
  readonly overrides?: Readonly<Record<string, CornerTreatment>>;
};

/** How a treatment would be done, in the few numbers that its heat follows from; lengths in m. */
export type OptionForm = {
  readonly loop?: Pick<Loop, 'shape' | 'radius' | 'extension'>;
  readonly dwell?: number; // s
  readonly ease?: { readonly length: number; readonly feedShare: number; readonly powerShare: number };
  /** Radius of the path. */
  readonly round?: number;
};

/** What one treatment would give at a corner. */
export type CornerOption = {
  readonly treatment: CornerTreatment;
  readonly fits: boolean;
  readonly returnWith: number | null; // K; null when it does not fit
  readonly addedTime: number | null; // s; below 0 where a round spares the stop
  readonly why: string;
  /** Where the thing in the way is, m. */
  readonly at?: Point;
  /** Of one that fits and is more than leaving the corner. */
  readonly form?: OptionForm;
};

/** What all corners of a plan share; loops placed so far are obstacles to the next. */
export type Context = {
  readonly request: CornerPlanRequest;
  readonly field: ObstacleField;
  readonly straightEdge: number;
  /** What the straight edge and the excess allowed make, K. */
  readonly limit: number;
  /** Loops placed that may come as near to a place as `reach`, m. */
  readonly loopsNear: (place: Point, reach: number) => readonly PlacedLoop[];
};

/** A corner with its place on the path, before anything is known of its heat. */
export type Prospect = {
  readonly id: string;
  readonly contour: PlanContour;
  readonly corner: Corner;
  readonly onPath: LoopCorner;
  /** Radius of the path's arc where the drawing rounds the corner itself, m. */
  readonly drawnRound: number | undefined;
  /** Length of path that is the corner's own: half the way to the corner before and to the next, m. */
  readonly room: { readonly before: number; readonly after: number };
};

/** What is known of a corner before anything is decided. */
export type Case = Prospect & {
  /** Path cut before the corner, in order of travel, ending in it. */
  readonly before: readonly Segment[];
  readonly without: number; // K
};

/** The piece of path that is eased: in order of travel, with the feed and the mean power of each step. */
export type EasedPath = {
  readonly before: number; // m
  readonly after: number; // m
  readonly feedShare: number;
  readonly powerShare: number;
  readonly pieces: readonly EasedPiece[];
};

/** What a treatment puts on the plate. */
type Put = { readonly loop?: Loop; readonly ease?: EasedPath; readonly round?: CornerRound };

/** A treatment that fits, before anything is known of its heat. */
export type Way = Put & {
  readonly treatment: CornerTreatment;
  /** s; of a dwell what getting the cut going again costs beside the wait. */
  readonly addedTime: number;
  /** What is asked about its heat; of a dwell without a wait. */
  readonly asks: Pick<ReturnQuestion, 'treatment' | 'round'>;
  /** The sentence about it, with the temperature that the tip returns at. */
  readonly say: (returnsAt: string) => string;
};

/** An option with what it would put on the plate. */
export type Candidate = CornerOption &
  Put & {
    /** The rules allow it at no corner: not worth a word where a corner is in trouble. */
    readonly ruledOut?: true;
    readonly dwell?: number;
  };
