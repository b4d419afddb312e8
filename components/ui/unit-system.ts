import { useSyncExternalStore } from 'react';
import type { Dimension, UnitSystem } from '@/strategy/units/index.ts';

const key = 'cinderpath.units';
const listeners = new Set<() => void>();

function subscribe(listener: () => void): () => void {
  listeners.add(listener);
  window.addEventListener('storage', listener);
  return () => {
    listeners.delete(listener);
    window.removeEventListener('storage', listener);
  };
}

function kept(): UnitSystem {
  try {
    return window.localStorage.getItem(key) === 'inch' ? 'inch' : 'metric';
  } catch {
    return 'metric'; // storage may be forbidden
  }
}

/** Metric or inch on this device, for what is shown and for numbers typed without a unit. */
export const useUnitSystem = (): UnitSystem => useSyncExternalStore(subscribe, kept, () => 'metric');

export function chooseUnitSystem(system: UnitSystem): void {
  try {
    window.localStorage.setItem(key, system);
  } catch {
    // Not kept then.
  }
  for (const listener of listeners) listener();
}

/** The unit of a number typed without one. Every dimension has one, in both systems. */
const usual: Record<Dimension, { readonly metric: string; readonly inch: string }> = {
  length: { metric: 'mm', inch: 'in' },
  time: { metric: 's', inch: 's' },
  speed: { metric: 'mm/min', inch: 'ipm' },
  acceleration: { metric: 'm/s²', inch: 'in/s²' },
  jerk: { metric: 'm/s³', inch: 'in/s³' },
  power: { metric: 'kW', inch: 'kW' },
  pressure: { metric: 'bar', inch: 'psi' },
  frequency: { metric: 'Hz', inch: 'Hz' },
  angle: { metric: '°', inch: '°' },
  temperature: { metric: '°C', inch: '°F' },
  temperatureDifference: { metric: 'K', inch: '°F' },
  ratio: { metric: '%', inch: '%' },
  energy: { metric: 'kJ', inch: 'kJ' },
  energyPerLength: { metric: 'J/mm', inch: 'J/in' },
  energyPerArea: { metric: 'J/mm²', inch: 'J/in²' },
  mass: { metric: 'kg', inch: 'lb' },
  volumeFlow: { metric: 'm³/h', inch: 'ft³/h' },
};

export const usualUnit = (dimension: Dimension, system: UnitSystem): string => usual[dimension][system];
