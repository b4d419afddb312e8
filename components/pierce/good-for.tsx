import { useQuery } from '@tanstack/react-query';
import { gradesQuery } from '@/components/data/grades.ts';
import { machinesQuery } from '@/components/data/machines.ts';
import { nozzlesQuery } from '@/components/data/nozzles.ts';
import { goodForText, nozzleWords } from '@/components/text/pierce.ts';
import { Choice } from '@/components/ui/choice.tsx';
import { ErrorNotice } from '@/components/ui/error-notice.tsx';
import { Sentence } from '@/components/ui/sentence.tsx';
import { Stack } from '@/components/ui/stack.tsx';
import { useUnitSystem } from '@/components/ui/unit-system.ts';
import type { StrategyContent } from '@/shared/strategies.ts';
import { DraftNumber, useDraft } from './draft-context.tsx';

/** Which plate, machine, grade group and nozzle the strategy is made for. */
export function GoodFor() {
  const { draft, dispatch, readOnly } = useDraft();
  const system = useUnitSystem();
  const machines = useQuery(machinesQuery());
  const nozzles = useQuery(nozzlesQuery());
  const grades = useQuery(gradesQuery());
  const { content } = draft;
  const change = (part: Partial<StrategyContent>, field?: string) =>
    dispatch({ do: 'change', field, change: (before) => ({ ...before, ...part }) });
  const failed = machines.error ?? nozzles.error ?? grades.error;
  const groups = [...new Set([content.gradeGroup, ...(grades.data ?? []).map((grade) => grade.group)])];

  return (
    <Stack gap="s">
      <Sentence>
        {goodForText.from}{' '}
        <ThicknessNumber
          end="min"
          onValue={(min) => change({ thickness: { ...content.thickness, min } }, 'thickness.min')}
        />{' '}
        {goodForText.upTo}{' '}
        <ThicknessNumber
          end="max"
          onValue={(max) => change({ thickness: { ...content.thickness, max } }, 'thickness.max')}
        />
        {goodForText.hottest}{' '}
        <DraftNumber
          field="hottestPlate"
          label={goodForText.label.hottestPlate}
          dimension="temperature"
          value={content.hottestPlate}
          onValue={(hottestPlate) => change({ hottestPlate }, 'hottestPlate')}
        />
      </Sentence>
      {!readOnly && (
        <>
          {failed !== null && <ErrorNotice error={failed} />}
          <Choice
            kind="list"
            label={goodForText.machine}
            options={(machines.data ?? []).flatMap((machine) =>
              machine.revisions.map((revision) => ({
                value: revision.id,
                label: goodForText.machineRevision(machine.name, revision.number),
              })),
            )}
            value={content.machineRevisionId}
            onChange={(machineRevisionId) => change({ machineRevisionId })}
          />
          <Choice
            kind="list"
            label={goodForText.nozzle}
            options={(nozzles.data ?? []).map((nozzle) => ({ value: nozzle.id, label: nozzleWords(nozzle, system) }))}
            value={content.nozzleId}
            onChange={(nozzleId) => change({ nozzleId })}
          />
          <Choice
            kind="list"
            label={goodForText.gradeGroup}
            options={groups.map((group) => ({ value: group, label: group }))}
            value={content.gradeGroup}
            onChange={(gradeGroup) => change({ gradeGroup })}
          />
        </>
      )}
    </Stack>
  );
}

function ThicknessNumber({ end, onValue }: { end: 'min' | 'max'; onValue: (micrometres: number) => void }) {
  const { draft } = useDraft();
  return (
    <DraftNumber
      field={`thickness.${end}`}
      label={goodForText.label[end]}
      dimension="length"
      value={draft.content.thickness[end] * 1e-6}
      onValue={(metres) => onValue(Math.round(metres * 1e6))}
    />
  );
}
