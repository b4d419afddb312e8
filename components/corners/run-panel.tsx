import { runText } from '@/components/text/corner-preview.ts';
import { Button } from '@/components/ui/button.tsx';
import { Fold } from '@/components/ui/fold.tsx';
import { Notice } from '@/components/ui/notice.tsx';
import { Panel } from '@/components/ui/panel.tsx';
import { Cell, Row, Stack } from '@/components/ui/stack.tsx';
import { Body, Figure, Small } from '@/components/ui/text.tsx';
import { clockMoment, type PlateClock } from '@/strategy/motion/index.ts';
import { CutSlider } from './cut-slider.tsx';
import { countBefore, type Dropped } from './run-layer.tsx';
import { runSpeed, useRunning, useRunTime, type RunClock } from './run-clock.ts';

type RunProps = { timeline: PlateClock; dropped: readonly Dropped[]; clock: RunClock };

type RunPanelProps = RunProps & {
  /** The path beside the edges, with its lead-ins, is not known. */
  alongEdges: boolean;
  /** Sentences of what is not cut as planned. */
  problems: readonly string[];
};

/** The cut run in order: a slider over its time, what happens then, and a button that runs it. */
export function RunPanel({ timeline, dropped, clock, alongEdges, problems }: RunPanelProps) {
  const { running, toggle } = useRunning(clock, timeline.duration);
  if (timeline.runs.length === 0) {
    return (
      <Panel title={runText.title}>
        <Problems problems={problems} />
        <Body>{runText.nothing}</Body>
      </Panel>
    );
  }
  return (
    <Panel title={runText.title}>
      <Problems problems={problems} />
      <RunNow timeline={timeline} dropped={dropped} clock={clock} />
      <Row gap="s">
        <Button label={running ? runText.stop : runText.run} onPress={toggle} />
        <Button label={runText.begin} kind="quiet" onPress={() => clock.set(0)} />
        <Cell least={150}>
          <Small>{runText.speed(runSpeed(timeline.duration))}</Small>
        </Cell>
      </Row>
      {alongEdges && <Small strong>{runText.alongEdges}</Small>}
      <Small>{runText.legend}</Small>
      <Fold label={runText.about}>
        <Stack gap="xs">
          <Small>{runText.keys}</Small>
          <Small>{runText.counted}</Small>
        </Stack>
      </Fold>
    </Panel>
  );
}

function Problems({ problems }: { problems: readonly string[] }) {
  if (problems.length === 0) return null;
  return (
    <Notice kind="caution" title={runText.problems}>
      {problems.slice(0, mostProblems).map((why) => (
        <Body key={why}>{why}</Body>
      ))}
      {problems.length > mostProblems && <Body>{runText.more(problems.length - mostProblems)}</Body>}
    </Notice>
  );
}

/** Of a drawing that is wrong throughout the rest says nothing new. */
const mostProblems = 5;

/** What the clock changes: nothing around it is drawn in a frame of the run. */
function RunNow({ timeline, dropped, clock }: RunProps) {
  const time = useRunTime(clock);
  const { duration, runs } = timeline;
  const moment = clockMoment(timeline, time);
  const at = runText.at(time, duration);
  const doing =
    time <= 0 || !moment
      ? runText.still
      : time >= duration
        ? runText.done
        : runText.doing(moment.phase, runs[moment.run]?.name ?? '');
  const fallen = runText.fallen(countBefore(dropped, time));
  return (
    <Stack gap="s">
      <CutSlider timeline={timeline} clock={clock} words={`${at}, ${doing}, ${fallen}`} />
      <Row justify="space-between" gap="s">
        <Figure value={at} />
        <Small strong>{`${doing}; ${fallen}`}</Small>
      </Row>
    </Stack>
  );
}
