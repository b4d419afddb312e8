import type { MachineProfile } from '@/strategy/machine.ts';
import type { Target } from './knots.ts';

/** How the numbers of the drawing are moved. */
export type KnotEditing = {
  readonly profile: MachineProfile;
  readonly target: Target | null;
  readonly onTarget: (target: Target) => void;
  /** While something is dragged: the value it would get; null when it goes back to where it was. */
  readonly onPreview: (preview: { target: Target; value: number } | null) => void;
  readonly onCommit: (target: Target, value: number) => void;
  /** A key or a button has been let go: what follows is another step. */
  readonly onSettle: () => void;
};
