import type { ClockPhase } from '@/strategy/motion/index.ts';
import { numberText, quantityText } from '@/strategy/units/index.ts';
import { count } from './corners.ts';

/** Whole seconds below a minute or two are what a hand on the slider can set. */
const time = (seconds: number) =>
  seconds < 100
    ? quantityText(seconds, 'time', 'metric', { decimals: 1 }).text
    : quantityText(seconds, 'time', 'metric', { figures: 3 }).text;

export const runText = {
  title: 'The cut in order',
  slider: 'Time of the cut',
  run: 'Run the cut',
  stop: 'Stop',
  begin: 'To the beginning',
  speed: (times: number) =>
    times > 1.05 ? `shown ${numberText(times, 1)} times as fast` : 'shown as fast as it is cut',
  at: (now: number, whole: number) =>
    `${time(now)} of ${time(whole)}, ${numberText(whole > 0 ? (100 * now) / whole : 0, 0)} %`,
  phase: {
    rapid: 'on the way to',
    lower: 'lowering the head over',
    raise: 'raising the head from',
    pierce: 'piercing',
    cut: 'cutting',
    wait: 'waiting at a corner of',
  },
  doing: (phase: ClockPhase, name: string) => `${runText.phase[phase]} ${name}`,
  still: 'before the first pierce',
  done: 'all is cut',
  fallen: (pieces: number) => (pieces === 0 ? 'nothing has dropped out' : `${count(pieces, 'piece')} dropped out`),
  keys: 'Keys on the slider: arrows 1 s (10 s with Shift), Page Up and Page Down from contour to contour, Home and End.',
  legend: 'Heavy: already cut. Hatched the other way: dropped out. Ring with a cross: the head.',
  counted:
    'Counted: ways between pierces, the head’s way down and up, each pierce’s routine, the path at its feed, lower where a corner is eased, and the waits with what getting the cut going again takes.',
  about: 'Keys, and what is counted',
  alongEdges: 'Run along the finished edges: lead-ins and the kerf are not in it.',
  problems: 'Not cut as planned',
  more: (number: number) => `And ${number} more.`,
  nothing: 'There is nothing to cut in this plan.',
} as const;

export const measureText = {
  toggle: 'Measure',
  end: 'Stop measuring',
  first: 'Tap the first place, or move the cross onto it with the arrow keys and press Enter.',
  second: 'Now the second place.',
  again: 'A third tap begins again.',
  snap: { corner: 'corner', end: 'end of a piece', centre: 'centre of an arc', free: 'free place' },
  from: (snap: string) => `From: ${snap}`,
  distance: 'distance',
  across: 'across',
  up: 'up',
  between: 'between',
  ends: (a: string, b: string) => `${a} to ${b}`,
} as const;

export const cornerToolText = {
  undo: 'Undo',
  redo: 'Redo',
  steps: 'Choices taken back and made again',
  keys: 'Ctrl or Cmd with Z takes the last choice back, with Shift as well it is made again.',
  all: 'Corners',
  open: (corners: number) => `${count(corners, 'corner')} in a list`,
  closeSheet: 'Close the list',
  filter: 'Show',
  every: 'All',
  trouble: 'Trouble',
  page: (from: number, to: number, of: number) => `${from} to ${to} of ${of}`,
  before: 'Earlier',
  after: 'Later',
  noneOf: 'No corner of this kind.',
  inTheWay: (corner: number) => `In the way of a loop at corner ${corner}`,
  cornerBefore: 'The corner before',
  cornerAfter: 'The corner after',
  show: 'Show',
  showOnDrawing: 'Show this corner on the drawing',
  slugLegend: 'slug, falls',
  eased: 'eased',
  leadIn: 'pierce and lead-in',
} as const;
