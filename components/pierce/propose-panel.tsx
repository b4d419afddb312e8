import { useState } from 'react';
import { View } from 'react-native';
import { unbroken } from '@/components/text/common.ts';
import { compareWords, proposeText } from '@/components/text/pierce-designer.ts';
import { resultLabel, resultValue } from '@/components/text/pierce-results.ts';
import { Button } from '@/components/ui/button.tsx';
import { Columns } from '@/components/ui/columns.tsx';
import { Facts } from '@/components/ui/facts.tsx';
import { Notice } from '@/components/ui/notice.tsx';
import { NumberField } from '@/components/ui/number-field.tsx';
import { Panel } from '@/components/ui/panel.tsx';
import { Progress } from '@/components/ui/progress.tsx';
import { Row, Stack } from '@/components/ui/stack.tsx';
import { Body, Heading, Small } from '@/components/ui/text.tsx';
import { Tick } from '@/components/ui/tick.tsx';
import { useUnitSystem } from '@/components/ui/unit-system.ts';
import type { Prediction } from '@/shared/strategies.ts';
import type { ReserveRules, Stage } from '@/strategy/pierce/index.ts';
import { quantityText } from '@/strategy/units/index.ts';
import type { ProposeAsked } from './propose.worker.ts';
import { InTheWay } from './in-the-way.tsx';
import type { ProposalGround } from './use-draft-proposal.ts';
import type { ProposalState } from './use-proposal.ts';

type ProposePanelProps = {
  /** Null while machine or nozzle are not known, or a number is wrong. */
  ground: ProposalGround | null;
  /** The least reserves the plant asks for: where the wish begins. */
  rules: ReserveRules;
  stages: readonly Stage[];
  stageKeys: readonly string[];
  state: ProposalState;
  /** What the proposed (or nearest) stages come to, and what there is now. */
  proposed: Prediction | null;
  now: Prediction;
  onBegin: (asked: ProposeAsked) => void;
  onCancel: () => void;
  onAccept: (stages: readonly Stage[]) => void;
  onClose: () => void;
};

const limitFields = [
  { name: 'routineTime', label: proposeText.longest, dimension: 'time' },
  { name: 'craterRadius', label: proposeText.crater, dimension: 'length' },
  { name: 'leadInLength', label: proposeText.leadIn, dimension: 'length' },
] as const;

type Limits = Readonly<Record<(typeof limitFields)[number]['name'], number | null>>;
const noLimits: Limits = { routineTime: null, craterRadius: null, leadInLength: null };

/** Asks the designer for a routine, around stages that are kept; its answer is looked at before it is taken. */
export function ProposePanel(props: ProposePanelProps) {
  const { ground, rules, stages, stageKeys, state, proposed, now, onBegin, onCancel, onAccept, onClose } = props;
  const [reserve, setReserve] = useState<Readonly<Record<'cold' | 'hot', number | null>>>(rules);
  const [limits, setLimits] = useState(noLimits);
  const [limiting, setLimiting] = useState(false);
  const [kept, setKept] = useState<ReadonlySet<string>>(new Set());
  // the answer puts the wishes out of the way, so that on a phone the drawing is near
  const [wishing, setWishing] = useState(true);

  const reserveError = (value: number | null) =>
    value !== null && value >= 1 && value <= 20 ? undefined : proposeText.reserveRange;
  const limitError = (value: number | null) =>
    value === null || (value > 0 && Number.isFinite(value)) ? undefined : proposeText.positive;
  const { cold, hot } = reserve;
  const sound = [...[cold, hot].map(reserveError), ...Object.values(limits).map(limitError)].every(
    (error) => error === undefined,
  );
  const begin = () => {
    if (!ground || !sound || cold === null || hot === null) return;
    setWishing(false);
    const pinned = stages.map((stage, index) => (kept.has(stageKeys[index] ?? '') ? stage : null));
    onBegin({
      ...ground,
      reserve: { cold, hot },
      limits: Object.fromEntries(Object.entries(limits).filter(([, limit]) => limit !== null)),
      ...(pinned.some((stage) => stage !== null) ? { pinned } : {}),
    });
  };

  if (state.kind === 'answered' && !wishing) {
    return (
      <Panel title={proposeText.title}>
        <Answer state={state} proposed={proposed} now={now} onAccept={onAccept} onDismiss={onCancel} />
        <Row>
          <Button kind="quiet" label={proposeText.wishes} onPress={() => setWishing(true)} />
          <Button kind="quiet" label={proposeText.close} onPress={onClose} />
        </Row>
      </Panel>
    );
  }
  return (
    <Panel title={proposeText.title}>
      <Body>{proposeText.meaning}</Body>
      <Columns least={200}>
        {(['cold', 'hot'] as const).map((plate) => (
          <NumberField
            key={plate}
            label={proposeText[plate]}
            dimension="ratio"
            unit="×"
            value={reserve[plate]}
            onChange={(value) => setReserve({ ...reserve, [plate]: value })}
            error={reserveError(reserve[plate])}
          />
        ))}
      </Columns>
      <Row>
        <Button
          kind="quiet"
          expanded={limiting}
          label={limiting ? proposeText.fewer : proposeText.more}
          onPress={() => {
            setLimiting(!limiting);
            // limits that are not in sight must not bind
            setLimits(noLimits);
          }}
        />
      </Row>
      {limiting && (
        <Columns least={200}>
          {limitFields.map(({ name, label, dimension }) => (
            <NumberField
              key={name}
              optional
              label={label}
              dimension={dimension}
              value={limits[name]}
              onChange={(value) => setLimits({ ...limits, [name]: value })}
              error={limitError(limits[name])}
            />
          ))}
        </Columns>
      )}
      <View role="group" aria-label={proposeText.keep}>
        <Heading level={3}>{proposeText.keep}</Heading>
        <Small>{proposeText.keepHint}</Small>
        <Columns least={110} gap={0}>
          {stages.map((stage, index) => {
            const key = stageKeys[index] ?? '';
            return (
              <Tick
                key={key}
                label={proposeText.keepStage(index + 1)}
                hint={quantityText(stage.duration, 'time', 'metric').text}
                checked={kept.has(key)}
                onChange={(keep) => setKept(withOrWithout(kept, key, keep))}
              />
            );
          })}
        </Columns>
      </View>
      {!ground && <Notice kind="plain">{proposeText.unsound}</Notice>}
      {state.kind === 'working' ? (
        <Stack gap="s">
          <Progress label={proposeText.working} value={state.share} />
          <Row>
            <Button label={proposeText.cancel} onPress={onCancel} />
          </Row>
        </Stack>
      ) : (
        <Row>
          <Button
            kind={state.kind === 'answered' ? 'plain' : 'main'}
            label={state.kind === 'answered' ? proposeText.again : proposeText.begin}
            disabled={!ground || !sound}
            onPress={begin}
          />
          <Button kind="quiet" label={proposeText.close} onPress={onClose} />
        </Row>
      )}
      {state.kind === 'refused' && (
        <Notice kind="wrong" title={proposeText.refused} live>
          {state.why}
        </Notice>
      )}
    </Panel>
  );
}

type AnswerProps = {
  state: ProposalState & { kind: 'answered' };
  proposed: Prediction | null;
  now: Prediction;
  onAccept: (stages: readonly Stage[]) => void;
  onDismiss: () => void;
};

function Answer({ state: { proposal }, proposed, now, onAccept, onDismiss }: AnswerProps) {
  const system = useUnitSystem();
  if (proposal.kind === 'none') {
    return (
      <InTheWay proposal={proposal}>
        <Small>{proposeText.nearest}</Small>
        {proposed && <Beside proposed={proposed} now={now} system={system} />}
        <Row>
          <Button label={proposeText.takeNearest} onPress={() => onAccept(proposal.nearest)} />
          <Button kind="quiet" label={proposeText.dismiss} onPress={onDismiss} />
        </Row>
      </InTheWay>
    );
  }
  const time = quantityText(proposal.prediction.routineTime, 'time', system).text;
  return (
    <Notice kind="ok" title={proposeText.proposed(proposal.stages.length, time)} live>
      <Small>{proposeText.drawn}</Small>
      {proposed && (
        <>
          <Body>{compareWords(proposeText.now, now, proposed)}</Body>
          <Beside proposed={proposed} now={now} system={system} />
        </>
      )}
      <Row>
        <Button kind="main" label={proposeText.accept} onPress={() => onAccept(proposal.stages)} />
        <Button kind="quiet" label={proposeText.dismiss} onPress={onDismiss} />
      </Row>
    </Notice>
  );
}

const compared = ['throughCold', 'reserveCold', 'reserveHot', 'crater', 'eruption', 'oxygen'] as const;

/** The proposal's numbers, yours in brackets. */
function Beside({ proposed, now, system }: { proposed: Prediction; now: Prediction; system: 'metric' | 'inch' }) {
  return (
    <Facts
      items={compared.map((name) => ({
        label: resultLabel[name],
        value: `${unbroken(resultValue(name, proposed, system))} (${unbroken(`${proposeText.now} ${resultValue(name, now, system)}`)})`,
      }))}
    />
  );
}

function withOrWithout(set: ReadonlySet<string>, key: string, wanted: boolean): ReadonlySet<string> {
  const next = new Set(set);
  if (wanted) next.add(key);
  else next.delete(key);
  return next;
}
