import { cutText, stageText } from '@/components/text/pierce.ts';
import { Aside, InlineButton, Sentence } from '@/components/ui/sentence.tsx';
import { Stack } from '@/components/ui/stack.tsx';
import { useUnitSystem } from '@/components/ui/unit-system.ts';
import { dialForFocus } from '@/strategy/beam/index.ts';
import type { CutConditions } from '@/strategy/corners/rules.ts';
import { quantityText, type Dimension } from '@/strategy/units/index.ts';
import { DraftNumber, useDraft } from './draft-context.tsx';

/** The cut after the pierce, told as sentences. */
export function CutSentence() {
  const { draft, dispatch, readOnly, scale } = useDraft();
  const system = useUnitSystem();
  const { cut } = draft.content;
  const dial = scale ? dialForFocus(scale, cut.focusPosition, cut.standoff) : null;
  const pulse = (frequency: number | null) =>
    dispatch({
      do: 'change',
      change: (content) => ({
        ...content,
        cut: { ...content.cut, pulseFrequency: frequency, duty: frequency === null ? 1 : content.cut.duty },
      }),
    });
  return (
    <Stack gap="xs">
      <Sentence>
        {cutText.feed} <CutNumber name="feed" dimension="speed" />
      </Sentence>
      <Sentence>
        {cutText.power} <CutNumber name="peakPower" dimension="power" />
        {cut.pulseFrequency === null ? (
          <>
            {` ${cutText.continuous}`}
            {!readOnly && (
              <InlineButton label={stageText.makePulsed} spoken={cutText.makePulsed} onPress={() => pulse(1000)} />
            )}
          </>
        ) : (
          <>
            {` ${cutText.duty} `}
            <CutNumber name="duty" dimension="ratio" />
            <Aside>{` ${cutText.mean(quantityText(cut.peakPower * cut.duty, 'power', system, { figures: 3 }).text)}`}</Aside>
            {` ${cutText.pulses} `}
            <CutNumber name="pulseFrequency" dimension="frequency" />
            {!readOnly && (
              <InlineButton
                label={stageText.makeContinuous}
                spoken={cutText.makeContinuous}
                onPress={() => pulse(null)}
              />
            )}
          </>
        )}
      </Sentence>
      <Sentence>
        {cutText.oxygen} <CutNumber name="oxygenPressure" dimension="pressure" />
      </Sentence>
      <Sentence>
        {cutText.standoff} <CutNumber name="standoff" dimension="length" /> {cutText.focus}{' '}
        <CutNumber name="focusPosition" dimension="length" sign />
        {dial?.kind === 'ok' && <Aside>{stageText.dial(dial.typed, dial.typed)}</Aside>}
        {dial?.kind === 'none' && <Aside tone="hot">{` ${dial.why}`}</Aside>}
      </Sentence>
      <Sentence>
        {cutText.kerf} <CutNumber name="kerfWidth" dimension="length" /> {cutText.heat}{' '}
        <CutNumber name="heatIntoPlate" dimension="energyPerArea" />
      </Sentence>
    </Stack>
  );
}

function CutNumber({ name, dimension, sign }: { name: keyof CutConditions; dimension: Dimension; sign?: boolean }) {
  const { draft, dispatch } = useDraft();
  const value = draft.content.cut[name];
  const field = `cut.${name}`;
  if (value === null) return null;
  return (
    <DraftNumber
      field={field}
      label={cutText.label[name]}
      dimension={dimension}
      sign={sign}
      value={value}
      onValue={(next) =>
        dispatch({
          do: 'change',
          field,
          change: (content) => ({ ...content, cut: { ...content.cut, [name]: next } }),
        })
      }
    />
  );
}
