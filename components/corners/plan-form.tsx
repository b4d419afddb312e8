import { useQuery } from '@tanstack/react-query';
import { useState, type ReactNode } from 'react';
import { strategiesQuery } from '@/components/data/strategies.ts';
import { common } from '@/components/text/common.ts';
import { cornerText } from '@/components/text/corners.ts';
import { partsText } from '@/components/text/parts.ts';
import { stateText } from '@/components/text/pierce.ts';
import { Button } from '@/components/ui/button.tsx';
import { Choice } from '@/components/ui/choice.tsx';
import { ErrorNotice } from '@/components/ui/error-notice.tsx';
import { Form } from '@/components/ui/form.tsx';
import { NumberField } from '@/components/ui/number-field.tsx';
import { Progress } from '@/components/ui/progress.tsx';
import { Cell, Row, Stack } from '@/components/ui/stack.tsx';
import { Body, Small } from '@/components/ui/text.tsx';
import type { BodyOf } from '@/shared/endpoint.ts';
import { cornerPlanEndpoints } from '@/shared/corner-plans.ts';
import type { StrategySummary } from '@/shared/strategies.ts';

export type PlanChoices = BodyOf<typeof cornerPlanEndpoints.redo>;
type Side = keyof PlanChoices['skeleton'];

const choicesSchema = cornerPlanEndpoints.redo.body;
const sides: readonly Side[] = ['left', 'right', 'below', 'above'];

type PlanFormProps = {
  initial: Omit<PlanChoices, 'revisionId'> & { revisionId: string | null };
  /** The revision used now, which the list may not offer any more. */
  current?: { id: string; label: string };
  /** Of a layout: its own plate, no skeleton to ask for. */
  ownPlate?: boolean;
  label: string;
  busy: boolean;
  error: ReactNode;
  onPlan: (choices: PlanChoices) => void;
};

/** With which strategy revision, how thick and how hot, and how much skeleton there is. */
export function PlanForm({ initial, current, ownPlate = false, label, busy, error, onPlan }: PlanFormProps) {
  const strategies = useQuery(strategiesQuery());
  const [revisionId, setRevision] = useState(initial.revisionId);
  const [thickness, setThickness] = useState<number | null>(initial.revisionId === null ? null : initial.thickness);
  const [plateTemperature, setTemperature] = useState<number | null>(initial.plateTemperature);
  const [skeleton, setSkeleton] = useState<Record<Side, number | null>>(initial.skeleton);
  const [sent, setSent] = useState(false);

  if (strategies.isError) {
    return <ErrorNotice error={strategies.error} onRetry={() => void strategies.refetch()} />;
  }
  if (!strategies.data) return <Progress label={common.loading} />;
  const options = revisionOptions(strategies.data, current);
  if (options.length === 0) return <Body>{partsText.noStrategies}</Body>;

  const read = choicesSchema.safeParse({
    revisionId,
    thickness: thickness ?? Number.NaN,
    plateTemperature: plateTemperature ?? Number.NaN,
    skeleton: Object.fromEntries(sides.map((side) => [side, skeleton[side] ?? Number.NaN])),
    overrides: initial.overrides,
  });
  const errorOf = (path: string) =>
    sent && !read.success ? read.error.issues.find((issue) => issue.path.join('.') === path)?.message : undefined;
  const choose = (id: string) => {
    setRevision(id);
    const range = options.find(({ value }) => value === id)?.thickness;
    // a plate from the middle of the range, until somebody says which
    if (range && thickness === null) setThickness(Math.round((range.min + range.max) / 2000) * 1e-3);
  };

  return (
    <Form
      label={label}
      onSubmit={() => {
        setSent(true);
        if (read.success) onPlan(read.data);
      }}
    >
      <Choice
        kind="list"
        label={cornerText.strategy}
        options={options}
        value={revisionId}
        onChange={choose}
        error={sent && revisionId === null ? cornerText.chooseStrategy : undefined}
      />
      <Row align="flex-start">
        <Cell least={150}>
          <NumberField
            label={cornerText.thickness}
            dimension="length"
            value={thickness}
            onChange={setThickness}
            error={errorOf('thickness')}
          />
        </Cell>
        <Cell least={150}>
          <NumberField
            label={cornerText.plateTemperature}
            dimension="temperature"
            value={plateTemperature}
            onChange={setTemperature}
            error={errorOf('plateTemperature')}
          />
        </Cell>
      </Row>
      {!ownPlate && (
        <Stack gap="xs">
          <Body strong>{cornerText.skeletonTitle}</Body>
          <Small>{cornerText.skeletonHint}</Small>
        </Stack>
      )}
      {!ownPlate && (
        <Row align="flex-start">
          {sides.map((side) => (
            <Cell key={side} least={130}>
              <NumberField
                label={cornerText.skeleton[side]}
                dimension="length"
                value={skeleton[side]}
                onChange={(value) => setSkeleton((before) => ({ ...before, [side]: value }))}
                error={errorOf(`skeleton.${side}`)}
              />
            </Cell>
          ))}
        </Row>
      )}
      {error}
      <Button kind="main" submit label={label} busy={busy} />
    </Form>
  );
}

type RevisionOption = { value: string; label: string; thickness: StrategySummary['thickness'] | null };

/** Of each strategy the approved revision and the newest one that was handed in, each said to be what it is. */
function revisionOptions(
  strategies: readonly StrategySummary[],
  current: PlanFormProps['current'],
): readonly RevisionOption[] {
  const options = strategies.flatMap(({ name, approved, latest, thickness }): RevisionOption[] => [
    ...(approved
      ? [
          {
            value: approved.id,
            label: cornerText.revisionOption(name, approved.number, stateText.approved),
            thickness,
          },
        ]
      : []),
    ...(latest.id === approved?.id || latest.state === 'draft'
      ? []
      : [
          {
            value: latest.id,
            label: cornerText.revisionOption(name, latest.number, stateText[latest.state]),
            thickness,
          },
        ]),
  ]);
  return current && !options.some(({ value }) => value === current.id)
    ? [{ value: current.id, label: current.label, thickness: null }, ...options]
    : options;
}
