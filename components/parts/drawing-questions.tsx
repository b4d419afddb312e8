import { useState } from 'react';
import { partsText, sizeBoth } from '@/components/text/parts.ts';
import { Button } from '@/components/ui/button.tsx';
import { Choice } from '@/components/ui/choice.tsx';
import { NumberField } from '@/components/ui/number-field.tsx';
import { Panel } from '@/components/ui/panel.tsx';
import { Stack } from '@/components/ui/stack.tsx';
import { Body, Heading } from '@/components/ui/text.tsx';
import { Tick } from '@/components/ui/tick.tsx';
import { useUnitSystem } from '@/components/ui/unit-system.ts';
import { drawingAnswersSchema, type DrawingAnswers, type DrawingReadingWire } from '@/shared/parts.ts';

type DrawingQuestionsProps = {
  reading: DrawingReadingWire;
  answers: DrawingAnswers;
  /** The drawing is read again with these. */
  onAnswer: (answers: DrawingAnswers) => void;
};

/** Least tolerance that is taken, m. */
const leastGap = 1e-9;

type Question<K> = Extract<DrawingReadingWire['questions'][number], { kind: K }>;

/** What the drawing doesn't say by itself: its unit, what to do about gaps, which layers to take. Answers can be changed until it is kept. */
export function DrawingQuestions({ reading, answers, onAnswer }: DrawingQuestionsProps) {
  const system = useUnitSystem();
  // a question that was answered is no longer asked by the next reading, and stays here to be answered otherwise
  const unitAsked = useLastAsked(reading.questions.find((one): one is Question<'unit'> => one.kind === 'unit'));
  const gapsAsked = useLastAsked(reading.questions.find((one): one is Question<'gaps'> => one.kind === 'gaps'));
  const [otherGap, setOtherGap] = useState(false);
  const several = reading.layers.length > 1;

  // Leaving them open is an answer too: a tolerance just below the narrowest.
  const narrowest = Math.min(Infinity, ...(gapsAsked?.gaps ?? []).map(({ size }) => size));
  const answered = answers.gapTolerance;
  const gapChoice = otherGap ? 'other' : answered === undefined ? null : answered < narrowest ? 'leave' : 'close';
  const withGap = (gapTolerance: number) => onAnswer({ ...answers, gapTolerance });

  return (
    <Panel title={partsText.questions}>
      {unitAsked && (
        <Stack gap="s">
          <Body>{unitAsked.why}</Body>
          <Choice
            kind="radios"
            label={partsText.unitQuestion}
            options={unitAsked.readings.map(({ unit, width, height }) => ({
              value: unit,
              label: partsText.unitOption(unit),
              hint: sizeBoth(width, height),
            }))}
            value={answers.unit ?? null}
            onChange={(unit) => {
              // a gap is as wide as the unit makes it: what was said about it before means nothing now
              const { gapTolerance: _before, ...rest } = answers;
              setOtherGap(false);
              onAnswer({ ...rest, unit });
            }}
          />
        </Stack>
      )}
      {gapsAsked && (
        <Stack gap="s">
          <Heading level={3}>{partsText.gapQuestion}</Heading>
          <Body>{gapsAsked.why}</Body>
          <Choice
            kind="radios"
            label={partsText.gapWhat}
            options={[
              { value: 'leave', label: partsText.gapOption.leave, hint: partsText.gapOption.leaveHint },
              {
                value: 'close',
                label: partsText.gapOption.close(gapsAsked.closesAt, system),
                hint: partsText.gapOption.closeHint,
              },
              { value: 'other', label: partsText.gapOption.other },
            ]}
            value={gapChoice}
            onChange={(choice) => {
              setOtherGap(choice === 'other');
              if (choice === 'leave') withGap(Math.max(narrowest * 0.999, leastGap));
              if (choice === 'close') withGap(gapsAsked.closesAt);
            }}
          />
          {otherGap && <OtherGap value={answers.gapTolerance ?? gapsAsked.closesAt} onGap={withGap} />}
        </Stack>
      )}
      {!gapsAsked &&
        (otherGap || answers.gapTolerance !== undefined ? (
          <OtherGap value={answers.gapTolerance ?? reading.gapTolerance} onGap={withGap} />
        ) : (
          <Stack gap="s">
            <Body>{partsText.joined(reading.gapTolerance, system)}</Body>
            <Button label={partsText.joinWider} onPress={() => setOtherGap(true)} />
          </Stack>
        ))}
      {several && (
        <Stack gap="hair">
          <Heading level={3}>{partsText.layers}</Heading>
          {reading.layers.map((layer) => (
            <Tick
              key={layer.name}
              label={partsText.layer(layer.name, layer.pieces)}
              checked={layer.taken}
              onChange={(take) => {
                const taken = reading.layers.filter((one) => (one.name === layer.name ? take : one.taken));
                onAnswer({ ...answers, layers: taken.map(({ name }) => name) });
              }}
            />
          ))}
        </Stack>
      )}
    </Panel>
  );
}

function OtherGap({ value, onGap }: { value: number; onGap: (metres: number) => void }) {
  const [typed, setTyped] = useState<number | null>(value);
  const read = drawingAnswersSchema.shape.gapTolerance.safeParse(typed ?? Number.NaN);
  return (
    <NumberField
      label={partsText.gapSize}
      dimension="length"
      value={typed}
      onChange={setTyped}
      error={read.success ? undefined : read.error.issues[0]?.message}
      // read again when the field is left, not at every digit
      onBlur={() => read.success && read.data !== undefined && onGap(read.data)}
    />
  );
}

function useLastAsked<Q>(now: Q | undefined): Q | undefined {
  const [last, setLast] = useState(now);
  if (now !== undefined && now !== last) setLast(now);
  return now ?? last;
}
