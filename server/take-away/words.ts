import type { RevisionState } from '../../shared/strategies.ts';
import { takeAwayCautions, type TakeAwayFormat } from '../../shared/take-away.ts';
import type { CutPath } from '../../strategy/path/cut-path.ts';
import { cutFileUnits, type CutFileUnit } from '../../strategy/path/drawing/write/index.ts';
import { contourCorners, cornerInward, type Point } from '../../strategy/path/index.ts';
import { quantityText, type Dimension, type UnitSystem } from '../../strategy/units/index.ts';
import type { Sheet, SheetCorner } from './sheet.ts';
import { cornerId } from './cut-path.ts';
import type { TakenPlan } from './repository.ts';

const systems = { mm: 'metric', inch: 'inch' } as const satisfies Record<CutFileUnit, UnitSystem>;

const states: Readonly<Record<RevisionState, string>> = {
  draft: 'a draft',
  inReview: 'in review',
  returned: 'returned',
  approved: 'approved',
  superseded: 'superseded',
  withdrawn: 'withdrawn',
};

export const planTitle = ({ planned }: TakenPlan): string => `Corner plan of ${planned.name}`;

/** What must stand in every file, a sentence each: of what, in which state, what the programmer must look at, the cautions. */
export function planNotes(
  taken: TakenPlan,
  as: TakeAwayFormat,
  unit: CutFileUnit,
  problems: readonly string[],
  at: Date,
): string[] {
  const { plan, revision, strategyName, machine } = taken;
  const shown = (value: number, dimension: Dimension) => quantityText(value, dimension, systems[unit]).text;
  const { feed, kerfWidth } = revision.content.cut;
  return [
    stateSentence(taken),
    `Strategy ${strategyName}, revision ${revision.number}, for machine ${machine.name}, revision ${machine.revision}.`,
    `Plate ${shown(plan.thickness, 'length')} thick, at ${shown(plan.plateTemperature, 'temperature')}. Feed ${shown(feed, 'speed')}, kerf ${shown(kerfWidth, 'length')}.`,
    `Corner plan ${plan.id}, version ${plan.version}, taken away ${momentText(at)}.`,
    ...troubleSentence(taken),
    ...easeSentence(taken, easeTold[as]),
    ...problems,
    ...takeAwayCautions,
  ];
}

function stateSentence({ revision }: TakenPlan): string {
  if (revision.state === 'approved') return 'The strategy revision is approved.';
  return `NOT APPROVED: the strategy revision is ${states[revision.state]}. No part is to be cut from this file.`;
}

function troubleSentence({ plan }: TakenPlan): string[] {
  const trouble = plan.corners.filter((corner) => corner.trouble !== null).length;
  if (trouble === 0) return [];
  return [
    trouble === 1 ? 'One corner is in trouble: see the plan.' : `${trouble} corners are in trouble: see the plan.`,
  ];
}

const easeTold: Readonly<Record<TakeAwayFormat, string>> = {
  dxf: 'listed in the comments below',
  svg: 'told at each piece by data-feed-share and data-power-share',
  iso: 'told in a comment before each',
  pdf: 'down to the shares of the cut’s own in the table',
};

/** `where` says how the file tells it. */
function easeSentence({ plan }: TakenPlan, where: string): string[] {
  const eased = plan.corners.filter(({ treatment }) => treatment === 'ease').length;
  if (eased === 0) return [];
  const corners = eased === 1 ? 'One corner is eased' : `${eased} corners are eased`;
  return [`${corners}: feed and power are lowered there in steps, ${where}.`];
}

/** Said first where blocks go without the plant's own lines. */
export const otherUnitNote = (unit: CutFileUnit): string =>
  `The plant's own lines are left out: they are for ${cutFileUnits[unit].name}, and these blocks are not.`;

/** The planner's reasons are clauses; whoever reads them gets sentences. */
export const sentence = (why: string): string =>
  `${why.charAt(0).toUpperCase()}${why.slice(1)}${/[.!?]$/.test(why) ? '' : '.'}`;

/** Whole minutes, UTC: plants lie in more than one zone. */
const momentText = (at: Date): string => `${at.toISOString().slice(0, 16).replace('T', ' ')} UTC`;

/** The sheet of a plan in the unit asked for. */
export function planSheet(
  taken: TakenPlan,
  path: CutPath,
  unit: CutFileUnit,
  problems: readonly string[],
  at: Date,
): Sheet {
  const { plan, planned, revision, strategyName, machine, plannedBy } = taken;
  const system = systems[unit];
  const shown = (value: number, dimension: Dimension, figures?: number) =>
    quantityText(value, dimension, system, figures === undefined ? {} : { figures }).text;
  const approved = revision.state === 'approved';
  const inward = new Map(
    planned.contours.flatMap(({ id, segments }) =>
      contourCorners({ segments }).map((corner) => [cornerId(id, corner.index), cornerInward(corner)] as const),
    ),
  );
  const { totals } = plan;
  const hottest = totals.hottestTreated === null ? '' : `, hottest ${shown(totals.hottestTreated, 'temperature')}`;
  return {
    paper: unit === 'mm' ? 'A4' : 'LETTER',
    kind: 'Corner plan',
    title: planned.name,
    approved,
    state: approved ? 'Approved' : `Not approved: ${states[revision.state]}`,
    block: [
      { label: 'strategy', value: `${strategyName}, revision ${revision.number}` },
      { label: 'machine', value: `${machine.name}, revision ${machine.revision}` },
      {
        label: 'plate',
        value: `${shown(plan.thickness, 'length')} thick, at ${shown(plan.plateTemperature, 'temperature')}`,
      },
      {
        label: 'cut',
        value: `${shown(revision.content.cut.feed, 'speed')}, kerf ${shown(revision.content.cut.kerfWidth, 'length')}`,
      },
      {
        label: 'corners',
        value: `${totals.corners}: ${treatmentsText(totals)}`,
      },
      {
        label: 'treatments add',
        value: `${shown(totals.addedTime, 'time', 3)}, ${shown(totals.addedLength, 'length', 3)} of path${hottest}`,
      },
      { label: 'planned', value: `${plannedBy}, ${plan.changedAt.toISOString().slice(0, 10)}` },
      { label: 'corner plan', value: `version ${plan.version}, ${plan.id.slice(-8)}` },
      { label: 'taken away', value: momentText(at) },
    ],
    contours: planned.contours.map(({ segments }) => ({ segments })),
    path,
    legend: {
      edge: 'finished edge',
      contour: 'contour',
      'lead-in': 'lead-in',
      loop: 'loop',
      pierce: 'pierce',
      wait: 'dwell',
    },
    columns: ['no.', 'place x, y', 'angle', 'treatment', 'radius', 'untreated', 'returns at', 'added time'],
    corners: plan.corners.map((corner): SheetCorner => {
      const radius = corner.loop?.radius ?? corner.round?.radius;
      const wait = corner.dwell === null ? '' : ` ${shown(corner.dwell, 'time')}`;
      return {
        at: corner.at,
        inward: inward.get(corner.id) ?? { x: 0, y: 0 },
        angle: corner.angle,
        row: [
          placeText(corner.at, system),
          quantityText(corner.angle, 'angle', system).text,
          `${corner.treatment}${wait}${easedTo(corner.ease)}${corner.chosenBy === 'person' ? ', by hand' : ''}`,
          radius === undefined ? '–' : shown(radius, 'length'),
          shown(corner.untreated, 'temperature'),
          shown(corner.treated, 'temperature'),
          shown(corner.addedTime, 'time', 3),
        ],
        trouble: corner.trouble && sentence(corner.trouble),
        caution: corner.caution ? sentence(corner.caution) : null,
      };
    }),
    noCorners: 'No corner here is below the angle that the rules treat.',
    notes: [stateSentence(taken), ...easeSentence(taken, easeTold.pdf), ...problems, ...takeAwayCautions, hazards],
    foot: `${takeAwayCautions[0]} ${takeAwayCautions[1]}`,
    at,
  };
}

/** Feed before power where the two differ. */
function easedTo(ease: TakenPlan['plan']['corners'][number]['ease']): string {
  if (!ease) return '';
  const [feed, power] = [ease.feedShare, ease.powerShare].map((share) => Math.round(share * 100));
  return feed === power ? ` to ${feed} %` : ` to ${feed}, ${power} %`;
}

const hazards = 'Class 4 laser radiation, oxygen-fed burning, fume, a hot plate, ejected slag.';

function treatmentsText({ loops, dwells, eases = 0, rounds = 0, trouble }: TakenPlan['plan']['totals']): string {
  const some = [
    counted(loops, 'loop'),
    counted(dwells, 'dwell'),
    ...(eases > 0 ? [counted(eases, 'ease')] : []),
    ...(rounds > 0 ? [counted(rounds, 'round')] : []),
    `${trouble} in trouble`,
  ];
  return some.join(', ');
}

const counted = (number: number, one: string): string => `${number} ${number === 1 ? one : `${one}s`}`;

function placeText({ x, y }: Point, system: UnitSystem): string {
  const [first, second] = [x, y].map((value) => quantityText(value, 'length', system));
  return `${first?.number}, ${second?.text}`;
}

const extensions: Readonly<Record<TakeAwayFormat, string>> = { dxf: 'dxf', svg: 'svg', iso: 'nc', pdf: 'pdf' };

/** A name for the file that every system takes: letters, figures and hyphens, and that it isn't approved. */
export function fileName({ planned, revision, plan }: TakenPlan, as: TakeAwayFormat, unit: CutFileUnit): string {
  const name = planned.name
    .normalize('NFKD')
    .replace(/\p{M}/gu, '')
    .replace(/[^A-Za-z0-9]+/g, '-')
    .replace(/^-+|-+$/g, '')
    .slice(0, 60)
    .toLowerCase();
  const parts = [
    name === '' ? 'part' : name,
    `plan-${plan.version}`,
    ...(revision.state === 'approved' ? [] : ['not-approved']),
    // an SVG is in millimetres always
    as === 'svg' ? 'mm' : unit,
  ];
  return `${parts.join('-')}.${extensions[as]}`;
}
