import type { Href } from 'expo-router';
import type { CardAsked } from '@/components/data/cards.ts';

export type CardPlate = {
  machineId: string;
  tag: string | null;
  gradeGroup: string | null;
  /** µm */
  thickness: number | null;
};

/** Where a plate's card stands. */
export function cardAddress({ machineId, tag, gradeGroup, thickness }: CardPlate): Href {
  return {
    pathname: '/card',
    params:
      tag === null
        ? { machine: machineId, gradeGroup: gradeGroup ?? '', thickness: String(thickness ?? '') }
        : { machine: machineId, tag },
  };
}

/** What the server is asked for it. */
export const cardAsked = ({ machineId, tag, gradeGroup, thickness }: CardPlate): CardAsked =>
  tag === null ? { machineId, gradeGroup: gradeGroup ?? '', thickness: thickness ?? 0 } : { machineId, tag };
