import { useState, type Dispatch } from 'react';
import { layoutsText } from '@/components/text/layouts.ts';
import { Button } from '@/components/ui/button.tsx';
import { InlineNumber } from '@/components/ui/inline-number.tsx';
import { Panel } from '@/components/ui/panel.tsx';
import { Sentence } from '@/components/ui/sentence.tsx';
import { Row } from '@/components/ui/stack.tsx';
import { useUnitSystem } from '@/components/ui/unit-system.ts';
import { placementSchema, type PlacementWire } from '@/shared/layouts.ts';
import { quantityText } from '@/strategy/units/index.ts';
import { turnWithin, type LayoutAction } from './layout-draft.ts';

type PiecePanelProps = {
  piece: PlacementWire;
  name: string;
  /** Length of one push, m; kept by the screen, so that it is the same for the next piece. */
  step: number;
  onStep: (metres: number) => void;
  dispatch: Dispatch<LayoutAction>;
  onCopy: () => void;
  onClose: () => void;
};

const pushes = [
  { side: 'left', x: -1, y: 0 },
  { side: 'right', x: 1, y: 0 },
  { side: 'up', x: 0, y: 1 },
  { side: 'down', x: 0, y: -1 },
] as const;

/** Where the chosen piece lies, as a sentence whose numbers can be typed, and pushes for who doesn't use a pointer. */
export function PiecePanel({ piece, name, step, onStep, dispatch, onCopy, onClose }: PiecePanelProps) {
  const system = useUnitSystem();
  const { number, at, turn, mirrored } = piece;
  const put = (change: Partial<PlacementWire>, field?: string) => dispatch({ do: 'put', number, change, field });
  return (
    <Panel title={layoutsText.chosen(number, name)}>
      <Sentence>
        {`${layoutsText.sentence.begins} `}
        <Typed
          label={layoutsText.x}
          dimension="length"
          value={at.x}
          fits={placementSchema.shape.at.shape.x.safeParse(at.x).success}
          onValue={(x) => put({ at: { ...at, x } }, 'x')}
        />
        {` ${layoutsText.sentence.left} `}
        <Typed
          label={layoutsText.y}
          dimension="length"
          value={at.y}
          fits={placementSchema.shape.at.shape.y.safeParse(at.y).success}
          onValue={(y) => put({ at: { ...at, y } }, 'y')}
        />
        {` ${layoutsText.sentence.below} `}
        <Typed
          label={layoutsText.turn}
          dimension="angle"
          value={turn}
          fits={placementSchema.shape.turn.safeParse(turn).success}
          onValue={(angle) => put({ turn: angle }, 'turn')}
        />
        {` ${mirrored ? layoutsText.sentence.mirrored : layoutsText.sentence.notMirrored}`}
      </Sentence>
      <Row gap="s">
        {pushes.map(({ side, x, y }) => (
          <Button
            key={side}
            label={layoutsText.pushes[side]}
            disabled={!(step > 0 && step <= 1)}
            spoken={layoutsText.pushed(side, quantityText(step, 'length', system).text)}
            onPress={() => put({ at: { x: at.x + x * step, y: at.y + y * step } }, 'pushed')}
          />
        ))}
      </Row>
      <Sentence>
        {`${layoutsText.step} `}
        <Typed label={layoutsText.step} dimension="length" value={step} fits={step > 0 && step <= 1} onValue={onStep} />
      </Sentence>
      <Row gap="s">
        <Button label={layoutsText.quarter} onPress={() => put({ turn: turnWithin(turn + Math.PI / 2) })} />
        <Button label={layoutsText.mirror} onPress={() => put({ mirrored: !mirrored })} />
        <Button label={layoutsText.copy} onPress={onCopy} />
        <Button label={layoutsText.remove} onPress={() => dispatch({ do: 'remove', number })} />
        <Button kind="quiet" label={layoutsText.close} onPress={onClose} />
      </Row>
    </Panel>
  );
}

/** A number within the sentence; a text that means none stays in the field and changes nothing. */
function Typed({
  label,
  dimension,
  value,
  fits,
  onValue,
}: {
  label: string;
  dimension: 'length' | 'angle';
  value: number;
  /** Whether it can be saved. */
  fits: boolean;
  onValue: (si: number) => void;
}) {
  const [unread, setUnread] = useState<string | undefined>(undefined);
  return (
    <InlineNumber
      label={label}
      dimension={dimension}
      value={value}
      unread={unread}
      onUnread={setUnread}
      error={fits ? undefined : layoutsText.outOfRange}
      onValue={(si) => {
        setUnread(undefined);
        onValue(si);
      }}
    />
  );
}
