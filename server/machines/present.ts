import type { Person } from '../../shared/basics.ts';
import type { Machine } from '../../shared/machines.ts';
import type { MachineWithRevisions } from './repository.ts';

export function presentMachine(
  { machine, revisions }: MachineWithRevisions,
  names: (userId: string) => Person,
): Machine {
  return {
    id: machine.id,
    version: machine.version,
    name: machine.name,
    revisions: revisions.map(({ id, number, profile, note, madeAt, madeBy }) => ({
      id,
      number,
      profile,
      note,
      madeAt: madeAt.toISOString(),
      madeBy: names(madeBy),
    })),
  };
}
