import { useState, type Dispatch } from 'react';
import { asSentence } from '@/components/text/corners.ts';
import { layoutsText } from '@/components/text/layouts.ts';
import { Button } from '@/components/ui/button.tsx';
import { Rows } from '@/components/ui/link-row.tsx';
import { Notice } from '@/components/ui/notice.tsx';
import { Panel } from '@/components/ui/panel.tsx';
import { PressRow } from '@/components/ui/press-row.tsx';
import { Row, Stack } from '@/components/ui/stack.tsx';
import { Body, Small } from '@/components/ui/text.tsx';
import {
  contourMoved,
  partMoved,
  partSequence,
  type OrderChange,
  type PlacedContour,
  type PlacedPart,
} from '@/strategy/path/plate/index.ts';
import type { LayoutAction } from './layout-draft.ts';

type OrderListProps = {
  lies: readonly PlacedPart[];
  order: readonly string[];
  byHand: boolean;
  chosen: number | null;
  onChoose: (number: number | null) => void;
  /** Null where the layout is read only. */
  dispatch: Dispatch<LayoutAction> | null;
};

/** The cut order, piece by piece; the chosen one and its contours can be moved. */
export function OrderList({ lies, order, byHand, chosen, onChoose, dispatch }: OrderListProps) {
  const [refused, setRefused] = useState<{ why: string; of: readonly string[] } | null>(null);
  const pieces = new Map(lies.map((part) => [part.number, part]));
  const places = new Map(order.map((id, i) => [id, i]));
  const take = (change: OrderChange) => {
    if (change.kind === 'ok') dispatch?.({ do: 'order', order: change.order });
    setRefused(change.kind === 'ok' ? null : { why: change.why, of: order });
  };
  const sequence = partSequence(order).flatMap((number) => pieces.get(number) ?? []);
  return (
    <Panel title={layoutsText.order}>
      <Small>{layoutsText.orderHint}</Small>
      {byHand && dispatch && (
        <Row>
          <Button label={layoutsText.computeAgain} onPress={() => dispatch({ do: 'order', order: null })} />
        </Row>
      )}
      {/* gone as soon as something moved */}
      {refused?.of === order && (
        <Notice kind="caution" live>
          {asSentence(refused.why)}
        </Notice>
      )}
      <Rows label={layoutsText.order}>
        {sequence.map((part, i) => {
          const own = contoursInOrder(part, places);
          const open = part.number === chosen;
          return (
            <Stack key={part.number} gap="xs">
              <PressRow
                chosen={open}
                spoken={`${i + 1}. ${part.name}: ${spoken(own, places)}`}
                onPress={() => onChoose(open ? null : part.number)}
                left={<Body strong>{`${i + 1}.`}</Body>}
              >
                <Body>{asSentence(part.name).replace(/\.$/, '')}</Body>
                <Small>{spoken(own, places)}</Small>
              </PressRow>
              {open && dispatch && (
                <Stack gap="s">
                  <Row gap="s">
                    <Button
                      label={layoutsText.earlier}
                      spoken={layoutsText.partEarlier(part.name)}
                      onPress={() => take(partMoved(lies, order, part.number, -1))}
                    />
                    <Button
                      label={layoutsText.later}
                      spoken={layoutsText.partLater(part.name)}
                      onPress={() => take(partMoved(lies, order, part.number, 1))}
                    />
                  </Row>
                  {own.length > 1 &&
                    own.map((contour) => (
                      <Row key={contour.id} gap="s" justify="space-between">
                        <Small
                          strong
                        >{`${layoutsText.numbered((places.get(contour.id) ?? 0) + 1)}  ${contour.name}`}</Small>
                        <Row gap="s">
                          <Button
                            kind="quiet"
                            label={layoutsText.earlier}
                            spoken={layoutsText.cutEarlier(contour.name)}
                            onPress={() => take(contourMoved(lies, order, contour.id, -1))}
                          />
                          <Button
                            kind="quiet"
                            label={layoutsText.later}
                            spoken={layoutsText.cutLater(contour.name)}
                            onPress={() => take(contourMoved(lies, order, contour.id, 1))}
                          />
                        </Row>
                      </Row>
                    ))}
                </Stack>
              )}
            </Stack>
          );
        })}
      </Rows>
    </Panel>
  );
}

const contoursInOrder = ({ contours }: PlacedPart, places: ReadonlyMap<string, number>): readonly PlacedContour[] =>
  [...contours].sort((a, b) => (places.get(a.id) ?? 0) - (places.get(b.id) ?? 0));

/** What is cut of it; said too when others come between. */
function spoken(own: readonly PlacedContour[], places: ReadonlyMap<string, number>): string {
  const outlines = own.filter(({ role }) => role === 'outer').length;
  const [first, last] = [own[0], own.at(-1)].map((one) => (one ? (places.get(one.id) ?? 0) : 0));
  const alone = (last ?? 0) - (first ?? 0) === own.length - 1;
  return `${layoutsText.contours(own.length - outlines, outlines)}${alone ? '' : `, ${layoutsText.mixed}`}`;
}
