import { useState } from 'react';
import { View } from 'react-native';
import { splitText, stageResultText } from '@/components/text/pierce-designer.ts';
import { explainText } from '@/components/text/pierce-explain.ts';
import { estimate, type StageResultName } from '@/components/text/pierce-results.ts';
import { editorText, stageText } from '@/components/text/pierce.ts';
import { Button } from '@/components/ui/button.tsx';
import { InlineNumber } from '@/components/ui/inline-number.tsx';
import { Aside, InlineButton, Sentence } from '@/components/ui/sentence.tsx';
import { Row, Stack } from '@/components/ui/stack.tsx';
import { Heading } from '@/components/ui/text.tsx';
import { useUnitSystem } from '@/components/ui/unit-system.ts';
import { limits } from '@/shared/limits.ts';
import { dialForFocus } from '@/strategy/beam/index.ts';
import type { Stage } from '@/strategy/pierce/stage.ts';
import { quantityText, type Dimension } from '@/strategy/units/index.ts';
import { DraftNumber, useDraft } from './draft-context.tsx';
import { stagePulsed, type RampQuantity } from './draft.ts';

export type StageResults = {
  /** At its end, m. */
  readonly depth: number;
  /** How near it comes to an eruption, in words; null where the hole is through before it. */
  readonly eruption: string | null;
  /** When the bottom comes to stand still in it, s; null where it does not. */
  readonly stall: number | null;
};

type StageSentenceProps = {
  index: number;
  stage: Stage;
  /** Said when the pierce gets through during this stage. */
  through: string | null;
  /** What it comes to, while that is known. */
  results: StageResults | null;
  onExplain: (name: StageResultName) => void;
  onChoose: () => void;
};

/** One stage told as sentences whose numbers are edited where they stand. */
export function StageSentence({ index, stage, through, results, onExplain, onChoose }: StageSentenceProps) {
  const { draft, dispatch, readOnly, scale } = useDraft();
  const system = useUnitSystem();
  const [acting, setActing] = useState(false);
  const key = draft.stageKeys[index] ?? '';
  const number = index + 1;
  const count = draft.content.stages.length;
  const [meanFrom, meanTo] = [stage.from, stage.to].map((at) =>
    quantityText(at.peakPower * at.duty, 'power', system, { figures: 3 }),
  );
  const dial = scale ? [stage.from, stage.to].map((at) => dialForFocus(scale, at.focusPosition, at.standoff)) : [];
  const firstDial = dial[0];
  const lastDial = dial[1];
  const pulsed = stage.from.pulseFrequency !== null;

  return (
    <View role="group" aria-label={stageText.name(number)} onFocus={onChoose}>
      <Stack gap="xs">
        <Row justify="space-between" gap="s">
          <Heading level={3}>{stageText.name(number)}</Heading>
          <Sentence>
            {stageText.lasts}{' '}
            <DraftNumber
              field={`${key}.duration`}
              label={stageText.duration(number)}
              dimension="time"
              value={stage.duration}
              onValue={(duration) =>
                dispatch({
                  do: 'stage',
                  index,
                  field: `${key}.duration`,
                  change: (before) => ({ ...before, duration }),
                })
              }
            />
          </Sentence>
        </Row>
        <Clause index={index} stage={stage} quantity="standoff" dimension="length" />
        <Clause index={index} stage={stage} quantity="focusPosition" dimension="length" sign>
          {firstDial?.kind === 'ok' && lastDial?.kind === 'ok' && (
            <Aside>{stageText.dial(firstDial.typed, lastDial.typed)}</Aside>
          )}
          {dial.map((reading, end) =>
            reading.kind === 'none' && (end === 0 || dial[0]?.kind === 'ok') ? (
              <Aside key={end} tone="hot">{` ${reading.why}`}</Aside>
            ) : null,
          )}
        </Clause>
        <Clause index={index} stage={stage} quantity="peakPower" dimension="power" />
        {pulsed && (
          <Clause index={index} stage={stage} quantity="duty" dimension="ratio">
            {meanFrom && meanTo && <Aside>{stageText.mean(meanFrom, meanTo)}</Aside>}
          </Clause>
        )}
        {pulsed ? (
          <Clause index={index} stage={stage} quantity="pulseFrequency" dimension="frequency">
            {!readOnly && (
              <InlineButton
                label={stageText.makeContinuous}
                spoken={stageText.makeContinuousSpoken(number)}
                onPress={() => dispatch({ do: 'stage', index, change: (before) => stagePulsed(before, null) })}
              />
            )}
          </Clause>
        ) : (
          <Sentence>
            {stageText.continuous}
            {!readOnly && (
              <InlineButton
                label={stageText.makePulsed}
                spoken={stageText.makePulsedSpoken(number)}
                onPress={() => dispatch({ do: 'stage', index, change: (before) => stagePulsed(before, 100) })}
              />
            )}
          </Sentence>
        )}
        <Clause index={index} stage={stage} quantity="oxygenPressure" dimension="pressure" />
        {(through !== null || results !== null) && (
          <Sentence>
            {through !== null && <Aside tone="cold">{through}</Aside>}
            {results && through === null && (
              <StageResult
                number={number}
                text={stageResultText.depth(quantityText(results.depth, 'length', system, estimate).text)}
                onPress={() => onExplain('depth')}
              />
            )}
            {results?.eruption != null && (
              <StageResult
                number={number}
                text={stageResultText.eruption(results.eruption)}
                onPress={() => onExplain('stageEruption')}
              />
            )}
            {results?.stall != null && (
              <StageResult
                number={number}
                text={stageResultText.stall(quantityText(results.stall, 'time', system, estimate).text)}
                onPress={() => onExplain('stall')}
              />
            )}
          </Sentence>
        )}
        {!readOnly && (
          <Row gap="xs">
            <Button
              kind="quiet"
              label={acting ? editorText.fewerActions : editorText.actions}
              spoken={editorText.actionsSpoken(number)}
              expanded={acting}
              onPress={() => setActing(!acting)}
            />
            {acting && (
              <>
                <Button
                  kind="quiet"
                  label={editorText.add}
                  spoken={editorText.addSpoken(number)}
                  disabled={count >= limits.stages}
                  onPress={() => dispatch({ do: 'add', at: number })}
                />
                <Button
                  kind="quiet"
                  label={editorText.duplicate}
                  spoken={editorText.duplicateSpoken(number)}
                  disabled={count >= limits.stages}
                  onPress={() => dispatch({ do: 'duplicate', index })}
                />
                <Button
                  kind="quiet"
                  label={splitText.split}
                  spoken={splitText.splitSpoken(number)}
                  disabled={count >= limits.stages}
                  onPress={() => dispatch({ do: 'split', index })}
                />
                <Button
                  kind="quiet"
                  label={editorText.earlier}
                  spoken={editorText.earlierSpoken(number)}
                  disabled={index === 0}
                  onPress={() => dispatch({ do: 'move', index, by: -1 })}
                />
                <Button
                  kind="quiet"
                  label={editorText.later}
                  spoken={editorText.laterSpoken(number)}
                  disabled={number === count}
                  onPress={() => dispatch({ do: 'move', index, by: 1 })}
                />
                <Button
                  kind="quiet"
                  label={editorText.remove}
                  spoken={editorText.removeSpoken(number)}
                  disabled={count === 1}
                  onPress={() => dispatch({ do: 'remove', index })}
                />
              </>
            )}
          </Row>
        )}
      </Stack>
    </View>
  );
}

function StageResult({ number, text, onPress }: { number: number; text: string; onPress: () => void }) {
  return <InlineButton label={text} spoken={explainText.spoken(stageText.name(number), text)} onPress={onPress} />;
}

type ClauseProps = {
  index: number;
  stage: Stage;
  quantity: RampQuantity;
  dimension: Dimension;
  sign?: boolean;
  children?: React.ReactNode;
};

/** One quantity of a stage: held, as one number, or ramped, from one to another. */
function Clause({ index, stage, quantity, dimension, sign = false, children }: ClauseProps) {
  const { draft, dispatch, readOnly, problems } = useDraft();
  const [opened, setOpened] = useState(false);
  const key = draft.stageKeys[index] ?? '';
  const number = index + 1;
  const from = stage.from[quantity];
  const to = stage.to[quantity];
  if (from === null || to === null) return null;
  const field = (end: 'from' | 'to') => `${key}.${end}.${quantity}`;
  // once two numbers, two fields: they must not close into one while somebody types the one's number into the other
  if (from !== to && !opened) setOpened(true);
  const ramped = opened || from !== to;
  const words = stageText.quantity[quantity];

  const end = (which: 'from' | 'to', both: boolean) => {
    // a held number is one field for both ends: what is wrong with either is said there
    const own = field(both ? 'to' : which);
    const set = (value: number) =>
      dispatch({ do: 'ramp', index, quantity, end: both ? 'both' : which, value, field: own });
    return (
      <InlineNumber
        label={both ? stageText.held(words, number) : stageText.end(words, which, number)}
        dimension={dimension}
        sign={sign}
        value={which === 'from' ? from : to}
        onValue={set}
        unread={draft.typed[own]}
        onUnread={(text) => dispatch({ do: 'type', field: own, text })}
        error={problems.get(own)}
        readOnly={readOnly}
      />
    );
  };

  return (
    <Sentence>
      {words}{' '}
      {ramped ? (
        <>
          {end('from', false)} {stageText.to} {end('to', false)}
        </>
      ) : (
        end('to', true)
      )}
      {!readOnly && quantity !== 'pulseFrequency' && (
        <InlineButton
          label={ramped ? stageText.hold : stageText.ramp}
          spoken={ramped ? stageText.holdSpoken(words, number) : stageText.rampSpoken(words, number)}
          onPress={() => {
            setOpened(!ramped);
            if (ramped) dispatch({ do: 'ramp', index, quantity, end: 'both', value: from, field: field('to') });
          }}
        />
      )}
      {children}
    </Sentence>
  );
}
