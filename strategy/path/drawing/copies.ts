import type { Joints } from './join.ts';
import type { Loose } from './overlap.ts';

/**
 * How often each loose piece is used, 0 to 2: as seldom as may be, and once more where an outline would else stay open. At each joint of closed contours an even
 * number of pieces arrives; where an odd number does, a piece that is drawn twice is the edge of two outlines and serves both. Pieces that end nowhere are not counted.
 */
export function copiesUsed(loose: Loose, joints: Joints): Uint8Array {
  const { pieces, least, most } = loose;
  const used = Uint8Array.from(least);
  if (least.every((count, i) => count === most[i])) return used;
  const [from, to] = [(i: number) => joints.at[2 * i] ?? 0, (i: number) => joints.at[2 * i + 1] ?? 0];
  const alive = closingPieces(loose, joints);
  const odd = new Uint8Array(joints.count);
  // pieces that may be used once more, by joint
  const spare = new Map<number, number[]>();
  for (let i = 0; i < pieces.length; i++) {
    if (!alive[i]) continue;
    if (used[i] === 1 && from(i) !== to(i)) {
      odd[from(i)] = 1 - (odd[from(i)] ?? 0);
      odd[to(i)] = 1 - (odd[to(i)] ?? 0);
    }
    if ((most[i] ?? 1) > (least[i] ?? 1)) {
      for (const joint of [from(i), to(i)]) {
        const there = spare.get(joint);
        if (there) there.push(i);
        else spare.set(joint, [i]);
      }
    }
  }
  const seen = new Set<number>();
  for (const root of spare.keys()) {
    if (seen.has(root)) continue;
    // a tree over all joints that spare pieces connect, each with the piece that leads towards the root
    const tree: { joint: number; by: number; up: number }[] = [{ joint: root, by: -1, up: -1 }];
    seen.add(root);
    let sum = 0;
    for (let k = 0; k < tree.length; k++) {
      const { joint } = tree[k] ?? { joint: root };
      sum += odd[joint] ?? 0;
      for (const i of spare.get(joint) ?? []) {
        const other = from(i) === joint ? to(i) : from(i);
        if (seen.has(other)) continue;
        seen.add(other);
        tree.push({ joint: other, by: i, up: joint });
      }
    }
    // an odd one would be left over: then which piece is missing can't be told
    if (sum % 2 === 1) continue;
    for (let k = tree.length - 1; k > 0; k--) {
      const step = tree[k];
      if (!step || odd[step.joint] !== 1) continue;
      used[step.by] = (used[step.by] ?? 0) + 1;
      odd[step.joint] = 0;
      odd[step.up] = 1 - (odd[step.up] ?? 0);
    }
  }
  return used;
}

/** Whether each piece, used as often as it may be, belongs to something closed: what ends alone is taken off again and again. */
export function closingPieces({ pieces }: Loose, joints: Joints): Uint8Array {
  const at = joints.at;
  const left = new Int32Array(joints.count);
  // the pieces at a joint as the sum of their numbers: when one is left the sum names it
  const sums = new Float64Array(joints.count);
  const change = (joint: number, i: number, by: 1 | -1) => {
    left[joint] = (left[joint] ?? 0) + by;
    sums[joint] = (sums[joint] ?? 0) + by * i;
  };
  for (let i = 0; i < pieces.length; i++) {
    change(at[2 * i] ?? 0, i, 1);
    change(at[2 * i + 1] ?? 0, i, 1);
  }
  const alive = new Uint8Array(pieces.length).fill(1);
  const alone: number[] = [];
  left.forEach((count, joint) => {
    if (count === 1) alone.push(joint);
  });
  for (let joint = alone.pop(); joint !== undefined; joint = alone.pop()) {
    if (left[joint] !== 1) continue;
    const i = sums[joint] ?? 0;
    alive[i] = 0;
    for (const end of [at[2 * i] ?? 0, at[2 * i + 1] ?? 0]) {
      change(end, i, -1);
      if (left[end] === 1) alone.push(end);
    }
  }
  return alive;
}
