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
 * on²/(2·rise). Continuous power loses nothing. Frequency in Hz, rise time in s.
 */
export function effectiveDuty(duty: number, frequency: number, riseTime: number): number {
  // Is the duty 1? Then the beam never goes off, whatever the frequency.
  if (duty >= 1) return 1;
  const onTime = duty / frequency;
  const counted = onTime >= riseTime ? onTime - riseTime / 2 : (onTime * onTime) / (2 * riseTime);
  return counted * frequency;
}
