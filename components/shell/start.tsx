import { Redirect } from 'expo-router';
import { useActor } from './actor.tsx';
import { startOf } from './places.ts';

/** Where the day begins, by role. */
export function Start() {
  const actor = useActor();
  return actor === null ? null : <Redirect href={startOf(actor)} />;
}
