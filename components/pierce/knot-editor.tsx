import { memo, useState } from 'react';
import { knotText } from '@/components/text/pierce-designer.ts';
import { Button } from '@/components/ui/button.tsx';
import { NumberField } from '@/components/ui/number-field.tsx';
import { Cell, Row, Stack } from '@/components/ui/stack.tsx';
import { Small } from '@/components/ui/text.tsx';
import type { Stage } from '@/strategy/pierce/stage.ts';
import type { UnitSystem } from '@/strategy/units/index.ts';
import type { KnotEditing } from './knot-editing.ts';
import {
  clamped,
  knotOf,
  stepped,
  targetDimension,
  targetRange,
  targetSteps,
  targetValue,
  type Target,
} from './knots.ts';

type KnotEditorProps = {
  editing: KnotEditing;
  target: Target;
  stages: readonly Stage[];
  system: UnitSystem;
};

/** The chosen number without dragging: one step less or more, or typed with its unit. */
export const KnotEditor = memo(function KnotEditor({ editing, target, stages, system }: KnotEditorProps) {
  const value = targetValue(stages, target);
  // a text that is no number of this range, with the number it was typed over
  const [unread, setUnread] = useState<{ value: number | null; over: number } | null>(null);
  if (value === null) return null;
  const knot = knotOf(stages, target);
  const range = targetRange(stages, target, editing.profile);
  const dimension = targetDimension(target);
  const { fine } = targetSteps(target, system);
  const label = knotText.field(target, knot);
  const own = unread?.over === value ? unread : null;
  const step = (direction: 1 | -1) => {
    setUnread(null);
    const next = clamped(stepped(value, direction, fine), range);
    if (next !== value) editing.onCommit(target, next);
    editing.onSettle();
  };
  const first = knot?.ends[0];
  const standoff = first ? (stages[first.stage]?.[first.end].standoff ?? 0) : 0;
  const error =
    own === null
      ? undefined
      : own.value === null || Number.isNaN(own.value)
        ? knotText.noNumber
        : target.kind === 'duration'
          ? knotText.outsideDuration(range)
          : knotText.outside(range, dimension, system);
  return (
    <Stack gap="xs">
      <Row align="flex-end" wrap={false} gap="s">
        <Cell>
          <NumberField
            label={label}
            dimension={dimension}
            value={own ? own.value : value}
            error={error}
            onBlur={editing.onSettle}
            onChange={(typed) => {
              if (typed !== null && typed >= range.min && typed <= range.max) {
                setUnread(null);
                if (typed !== value) editing.onCommit(target, typed);
              } else setUnread({ value: typed, over: value });
            }}
          />
        </Cell>
        <Button label="−" spoken={knotText.lessSpoken(label)} disabled={value <= range.min} onPress={() => step(-1)} />
        <Button label="+" spoken={knotText.moreSpoken(label)} disabled={value >= range.max} onPress={() => step(1)} />
      </Row>
      {knot?.lane === 'focusPosition' && (
        <Small strong>{knotText.dial(editing.profile.focusScale, knot.set, standoff)}</Small>
      )}
      {knot?.lane === 'meanPower' && <Small>{knotText.mean(knot.set, knot.duty, system)}</Small>}
    </Stack>
  );
});
