import { cardText } from '@/components/text/card.ts';
import { dialNumber } from '@/components/text/pierce.ts';
import { MINUS, quantityText, type Dimension, type UnitSystem } from '@/strategy/units/index.ts';
import type { Card } from '@/shared/cards.ts';
import type { FigureCell } from './figure-cells.tsx';

type Approved = Extract<Card['match'], { kind: 'approved' }>;
export type CardStage = Approved['stages'][number];
export type CardCut = Approved['cut'];

/** From one number to another in one unit; one number where they are the same. */
export function rampFigure(
  from: number,
  to: number,
  dimension: Dimension,
  system: UnitSystem,
): { value: string; unit: string } {
  // the larger of both chooses the unit, so that 0.09 and 1.4 kW are not shown as 90 and 1.4
  const { unit } = quantityText(Math.abs(from) > Math.abs(to) ? from : to, dimension, system);
  const shown = [from, to].map((value) => trimZeros(quantityText(value, dimension, system, { unit }).number));
  return { value: shown[0] === shown[1] ? (shown[0] ?? '') : shown.join(' → '), unit };
}

const trimZeros = (number: string) => (number.includes('.') ? number.replace(/\.?0+$/, '') : number);

/** The numbers to type, as the machine's dial shows them; where there is none the reason stands beside the stage. */
function dialFigure(from: CardStage['from']['dial'], to: CardStage['to']['dial']): FigureCell {
  const shown = [from, to].map((dial) => (dial.kind === 'ok' ? dialNumber(dial.typed) : MINUS));
  return { label: cardText.dial, value: shown[0] === shown[1] ? (shown[0] ?? '') : shown.join(' → ') };
}

/** Why a dial number is missing, once. */
export const dialTrouble = (...dials: readonly CardStage['from']['dial'][]): string | null =>
  dials.flatMap((dial) => (dial.kind === 'none' ? [dial.why] : []))[0] ?? null;

export function stageFigures({ from, to }: CardStage, system: UnitSystem): FigureCell[] {
  const cell = (label: string, a: number, b: number, dimension: Dimension): FigureCell => ({
    label,
    ...rampFigure(a, b, dimension, system),
  });
  return [
    dialFigure(from.dial, to.dial),
    cell(cardText.standoff, from.standoff, to.standoff, 'length'),
    cell(cardText.peak, from.peakPower, to.peakPower, 'power'),
    ...(from.pulseFrequency === null || to.pulseFrequency === null
      ? [{ label: cardText.pulses, value: cardText.continuous }]
      : [
          cell(cardText.duty, from.duty, to.duty, 'ratio'),
          cell(cardText.pulses, from.pulseFrequency, to.pulseFrequency, 'frequency'),
        ]),
    cell(cardText.oxygen, from.oxygenPressure, to.oxygenPressure, 'pressure'),
  ];
}

export function cutFigures(cut: CardCut, system: UnitSystem): FigureCell[] {
  const cell = (label: string, value: number, dimension: Dimension): FigureCell => ({
    label,
    ...rampFigure(value, value, dimension, system),
  });
  return [
    cell(cardText.feed, cut.feed, 'speed'),
    dialFigure(cut.dial, cut.dial),
    cell(cardText.standoff, cut.standoff, 'length'),
    cell(cardText.peak, cut.peakPower, 'power'),
    ...(cut.pulseFrequency === null
      ? [{ label: cardText.pulses, value: cardText.continuous }]
      : [cell(cardText.duty, cut.duty, 'ratio'), cell(cardText.pulses, cut.pulseFrequency, 'frequency')]),
    cell(cardText.oxygen, cut.oxygenPressure, 'pressure'),
    cell(cardText.kerf, cut.kerfWidth, 'length'),
  ];
}

/** The most oxygen pressure that the card asks for, Pa: what the line must be ready for. */
export const highestPressure = ({ stages, cut }: Approved): number =>
  Math.max(cut.oxygenPressure, ...stages.flatMap(({ from, to }) => [from.oxygenPressure, to.oxygenPressure]));
