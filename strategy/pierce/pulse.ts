import type { StageQuantities } from './stage.ts';

/** What a train of pulses amounts to. */
export type PulseTrain = {
  /** Mean power as set, W: peak × duty. */
  readonly meanPower: number;
  /** Time the beam is on in one pulse, s; null for continuous power. */
  readonly onTime: number | null;
  /** Energy of one pulse as set, J; null for continuous power. */
  readonly pulseEnergy: number | null;
};

/** Mean power, on-time and energy of the pulses as set: P·D, D/f, P·D/f. */
export function pulseTrain(set: Pick<StageQuantities, 'peakPower' | 'duty' | 'pulseFrequency'>): PulseTrain {
  const meanPower = set.peakPower * set.duty;
  if (set.pulseFrequency === null) return { meanPower, onTime: null, pulseEnergy: null };
  return { meanPower, onTime: set.duty / set.pulseFrequency, pulseEnergy: meanPower / set.pulseFrequency };
}

/**
 * Mean time the beam counts as fully on, as a share of all time. The power is taken to rise linearly over the source's rise
 * time and to fall at once, so a pulse loses half a rise time; one shorter than the rise never reaches its peak and counts
 * on²/(2·rise). After a pause shorter than the rise the power has not fallen all the way, and the loss shrinks with the pause, to
 * nothing at duty 1. Frequency in Hz, rise time in s.
 */
export function effectiveDuty(duty: number, frequency: number, riseTime: number): number {
  const onTime = duty / frequency;
  const pause = (1 - duty) / frequency;
  const loss = onTime >= riseTime ? riseTime / 2 : onTime - (onTime * onTime) / (2 * riseTime);
  return (onTime - (pause >= riseTime ? loss : (loss * pause) / riseTime)) * frequency;
}
