import { useQuery } from '@tanstack/react-query';
import { useRouter } from 'expo-router';
import { useState } from 'react';
import { newId } from '@/components/data/call.ts';
import { gradesQuery } from '@/components/data/grades.ts';
import { houseRulesQuery } from '@/components/data/house-rules.ts';
import { machinesQuery } from '@/components/data/machines.ts';
import { nozzlesQuery } from '@/components/data/nozzles.ts';
import { isProblem } from '@/components/data/problem.ts';
import { useStrategyAdd } from '@/components/data/strategies.ts';
import { Page } from '@/components/shell/page.tsx';
import { common } from '@/components/text/common.ts';
import { proposeText } from '@/components/text/pierce-designer.ts';
import { goodForText, nozzleWords, strategiesText, thicknessRangeText } from '@/components/text/pierce.ts';
import { Button } from '@/components/ui/button.tsx';
import { Choice } from '@/components/ui/choice.tsx';
import { Empty } from '@/components/ui/empty.tsx';
import { ErrorNotice } from '@/components/ui/error-notice.tsx';
import { EstimateNote } from '@/components/ui/estimate-note.tsx';
import { Form } from '@/components/ui/form.tsx';
import { ThicknessField } from '@/components/ui/form-fields.tsx';
import { Notice } from '@/components/ui/notice.tsx';
import { NumberField } from '@/components/ui/number-field.tsx';
import { Panel } from '@/components/ui/panel.tsx';
import { Progress } from '@/components/ui/progress.tsx';
import { Cell, Row, Stack } from '@/components/ui/stack.tsx';
import { Body } from '@/components/ui/text.tsx';
import { TextField } from '@/components/ui/text-field.tsx';
import { useUnitSystem } from '@/components/ui/unit-system.ts';
import { nameSchema } from '@/shared/basics.ts';
import type { HouseRule } from '@/shared/house-rules.ts';
import type { Machine, NozzleRow } from '@/shared/machines.ts';
import { reserveRulesOf } from '@/shared/prediction.ts';
import { strategyContentSchema } from '@/shared/strategies.ts';
import type { MachineProfile, Nozzle } from '@/strategy/machine.ts';
import type { Stage } from '@/strategy/pierce/stage.ts';
import { firstContent, type FirstChoices } from './first-content.ts';
import { InTheWay } from './in-the-way.tsx';
import { groundOf, groundSame } from './use-draft-proposal.ts';
import { useProposal } from './use-proposal.ts';

const choicesSchema = strategyContentSchema.pick({
  machineRevisionId: true,
  gradeGroup: true,
  nozzleId: true,
  thickness: true,
  hottestPlate: true,
});

type AskedFor = {
  readonly machineId?: string | null;
  readonly gradeGroup?: string | null;
  /** µm */
  readonly thickness?: number | null;
};

/** How far the suggested range reaches beyond the plate that was asked for, to both sides, or typed, upwards; µm. */
const reach = 1000;

/** Begins a strategy: for which machine, grade group, thickness and nozzle. The draft starts with what the designer proposes for them. */
export function StrategyNewScreen(asked: AskedFor) {
  const machines = useQuery(machinesQuery());
  const nozzles = useQuery(nozzlesQuery());
  const grades = useQuery(gradesQuery());
  const houseRules = useQuery(houseRulesQuery());
  const failed = [machines, nozzles, grades, houseRules].find((query) => query.isError);
  const ready = machines.data && nozzles.data && grades.data && houseRules.data;
  return (
    <Page title={strategiesText.newTitle} measure="reading">
      {failed ? (
        <ErrorNotice error={failed.error} onRetry={() => void failed.refetch()} />
      ) : !ready ? (
        <Progress label={common.loading} />
      ) : machines.data.length === 0 || nozzles.data.length === 0 || grades.data.length === 0 ? (
        <Empty title={strategiesText.lacking}>{strategiesText.lackingHint}</Empty>
      ) : (
        <NewForm
          machines={machines.data}
          nozzles={nozzles.data}
          groups={[...new Set(grades.data.map((grade) => grade.group))]}
          houseRules={houseRules.data.filter(({ endedAt }) => endedAt === null)}
          asked={asked}
        />
      )}
      <EstimateNote />
    </Page>
  );
}

type NewFormProps = {
  machines: readonly Machine[];
  nozzles: readonly NozzleRow[];
  groups: readonly string[];
  /** Those in force. */
  houseRules: readonly HouseRule[];
  asked: AskedFor;
};

function NewForm({ machines, nozzles, groups, houseRules, asked }: NewFormProps) {
  const router = useRouter();
  const system = useUnitSystem();
  const add = useStrategyAdd();
  const search = useProposal();
  const [ids] = useState(() => ({ id: newId(), revisionId: newId() }));
  const [machineRevisionId, setMachine] = useState<string | null>(
    () =>
      (machines.length === 1 ? machines[0] : machines.find(({ id }) => id === asked.machineId))?.revisions[0]?.id ??
      null,
  );
  const [gradeGroup, setGroup] = useState<string | null>(
    () => (groups.length === 1 ? groups[0] : groups.find((group) => group === asked.gradeGroup)) ?? null,
  );
  const [nozzleId, setNozzle] = useState<string | null>(nozzles.length === 1 ? (nozzles[0]?.id ?? null) : null);
  const [min, setMin] = useState<number | null>(asked.thickness ? asked.thickness - reach : null);
  const [typedMax, setMax] = useState<{ value: number | null } | null>(null);
  const [hottestPlate, setHottest] = useState<number | null>(273.15 + 200);
  const [typedName, setName] = useState<string | null>(null);
  const [sent, setSent] = useState(false);
  // one thickness of plate, until another end is typed
  const nextMax = asked.thickness ? asked.thickness + reach : min === null ? null : min + reach;
  const max = typedMax === null ? nextMax : typedMax.value;

  const machine = machines.find(({ revisions }) => revisions.some(({ id }) => id === machineRevisionId));
  const profile = machine?.revisions.find(({ id }) => id === machineRevisionId)?.profile;
  const nozzle = nozzles.find(({ id }) => id === nozzleId);
  const known = machine && gradeGroup !== null && min !== null && max !== null;
  const range = known && Number.isFinite(min) && Number.isFinite(max) ? thicknessRangeText({ min, max }, system) : null;
  const suggested =
    machine && gradeGroup !== null && range ? strategiesText.suggested(gradeGroup, range, machine.name) : '';
  const name = typedName ?? suggested;

  const read = choicesSchema.safeParse({
    machineRevisionId,
    gradeGroup,
    nozzleId,
    thickness: { min: min ?? Number.NaN, max: max ?? Number.NaN },
    hottestPlate: hottestPlate ?? Number.NaN,
  });
  const nameRead = nameSchema.safeParse(name);
  // what the server said of the name holds until another is typed
  const nameTaken =
    isProblem(add.error) && add.variables?.name === nameRead.data
      ? add.error.fields.find(({ pointer }) => pointer === '/name')?.detail
      : undefined;
  const errorOf = (path: string): string | undefined => {
    if (!sent) return undefined;
    if (path === 'name') return nameRead.success ? nameTaken : nameRead.error.issues[0]?.message;
    const issue = read.success ? undefined : read.error.issues.find((one) => one.path.join('.') === path);
    if (!issue) return undefined;
    return path in strategiesText.missing
      ? strategiesText.missing[path as keyof typeof strategiesText.missing]
      : issue.message; // `in` has just said so
  };
  const ground = read.success && profile && nozzle ? groundOf(read.data, profile, nozzle, houseRules) : null;
  const begin = () => {
    setSent(true);
    if (!read.success || !nameRead.success || !profile || !nozzle || !ground) return;
    const save = (stages: readonly Stage[]) => addWith(read.data, nameRead.data, profile, nozzle, stages);
    const reserve = reserveRulesOf(houseRules.map(({ expression }) => expression));
    search.begin({ ...ground, reserve }, (proposal) => {
      if (proposal.kind === 'ok') save(proposal.stages);
    });
  };
  const addWith = (
    choices: FirstChoices,
    strategyName: string,
    machineProfile: MachineProfile,
    fitted: Nozzle,
    stages: readonly Stage[],
  ) =>
    add.mutate(
      { ...ids, name: strategyName, content: firstContent(choices, machineProfile, fitted, stages) },
      { onSuccess: () => router.replace(`/revisions/${ids.revisionId}`) },
    );
  // an answer to what stands in the form no more is none
  const { state } = search;
  const none =
    state.kind === 'answered' && state.proposal.kind === 'none' && ground !== null && groundSame(ground, state.asked)
      ? state.proposal
      : null;

  return (
    <Form onSubmit={begin} label={strategiesText.newTitle}>
      <Panel>
        <Choice
          kind="list"
          label={goodForText.machine}
          options={machines.flatMap(({ name: of, revisions }) =>
            revisions.map(({ id, number }) => ({ value: id, label: goodForText.machineRevision(of, number) })),
          )}
          value={machineRevisionId}
          onChange={setMachine}
          error={errorOf('machineRevisionId')}
        />
        <Choice
          kind={groups.length > 4 ? 'list' : 'segments'}
          label={goodForText.gradeGroup}
          options={groups.map((group) => ({ value: group, label: group }))}
          value={gradeGroup}
          onChange={setGroup}
          error={errorOf('gradeGroup')}
        />
        <Row align="flex-start">
          <Cell least={160}>
            <ThicknessField
              label={goodForText.label.min}
              value={min}
              onChange={setMin}
              hint={strategiesText.minHint}
              error={errorOf('thickness.min')}
            />
          </Cell>
          <Cell least={160}>
            <ThicknessField
              label={goodForText.label.max}
              value={max}
              onChange={(value) => setMax({ value })}
              hint={strategiesText.maxHint}
              error={errorOf('thickness.max')}
            />
          </Cell>
        </Row>
        <NumberField
          label={goodForText.label.hottestPlate}
          dimension="temperature"
          value={hottestPlate}
          onChange={setHottest}
          error={errorOf('hottestPlate')}
        />
        <Choice
          kind="list"
          label={goodForText.nozzle}
          options={nozzles.map((one) => ({ value: one.id, label: nozzleWords(one, system) }))}
          value={nozzleId}
          onChange={setNozzle}
          error={errorOf('nozzleId')}
        />
      </Panel>
      <TextField
        label={strategiesText.name}
        hint={strategiesText.nameHint}
        value={name}
        onChange={setName}
        error={errorOf('name')}
      />
      <Body tone="softInk">{strategiesText.defaults}</Body>
      {state.kind === 'refused' && (
        <Notice kind="wrong" title={strategiesText.beyond} live>
          {state.why}
        </Notice>
      )}
      {none && read.success && nameRead.success && profile && nozzle && (
        <InTheWay proposal={none}>
          <Row>
            <Button
              label={strategiesText.beginNearest}
              busy={add.isPending}
              onPress={() => addWith(read.data, nameRead.data, profile, nozzle, none.nearest)}
            />
          </Row>
        </InTheWay>
      )}
      {add.isError && <ErrorNotice error={add.error} />}
      {state.kind === 'working' ? (
        <Stack gap="s">
          <Progress label={proposeText.working} value={state.share} />
          <Row>
            <Button label={proposeText.cancel} onPress={search.clear} />
          </Row>
        </Stack>
      ) : (
        <Button kind="main" submit label={strategiesText.begin} busy={add.isPending} />
      )}
    </Form>
  );
}
