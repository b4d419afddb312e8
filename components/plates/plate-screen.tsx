import { useQuery } from '@tanstack/react-query';
import { plateQuery } from '@/components/data/plates.ts';
import { isProblem } from '@/components/data/problem.ts';
import { useActor } from '@/components/shell/actor.tsx';
import { NothingHere } from '@/components/shell/nothing-here.tsx';
import { Page } from '@/components/shell/page.tsx';
import { momentText } from '@/components/text/moments.ts';
import { platesText, surfaceNames } from '@/components/text/plates.ts';
import { thicknessText } from '@/components/text/thickness.ts';
import { ErrorNotice } from '@/components/ui/error-notice.tsx';
import { Facts } from '@/components/ui/facts.tsx';
import { Progress } from '@/components/ui/progress.tsx';
import { Sheet } from '@/components/ui/sheet.tsx';
import { useUnitSystem } from '@/components/ui/unit-system.ts';
import type { Plate } from '@/shared/plates.ts';
import { may } from '@/shared/policy.ts';
import { quantityText } from '@/strategy/units/index.ts';
import { PlateCards } from './plate-cards.tsx';
import { PlateCorrectForm } from './plate-correct-form.tsx';

/** One plate: what it is, its card on each machine, and the form to correct it for who may. */
export function PlateScreen({ id }: { readonly id: string }) {
  const plate = useQuery(plateQuery(id));
  const actor = useActor();
  if (plate.isPending) {
    return (
      <Page>
        <Progress label={platesText.fetching} />
      </Page>
    );
  }
  if (plate.data === undefined) {
    if (isProblem(plate.error, 'not-found')) return <NothingHere />;
    return (
      <Page>
        <ErrorNotice error={plate.error} onRetry={() => void plate.refetch()} />
      </Page>
    );
  }
  return (
    <Page title={plate.data.tag} eyebrow={platesText.eyebrow} aside={<PlateCards tag={plate.data.tag} />}>
      <PlateBlock plate={plate.data} />
      {actor !== null && may(actor, 'plate.write') ? (
        <PlateCorrectForm plate={plate.data} />
      ) : (
        <PlateFacts plate={plate.data} />
      )}
    </Page>
  );
}

function PlateBlock({ plate }: { readonly plate: Plate }) {
  const system = useUnitSystem();
  return (
    <Sheet
      label={platesText.block}
      cells={[
        { label: 'grade', value: plate.grade.name },
        { label: 'group', value: plate.grade.group },
        { label: 'nominal', value: thicknessText(plate.nominalThickness, system) },
        {
          label: 'measured',
          value: plate.measuredThickness === null ? '–' : thicknessText(plate.measuredThickness, system),
        },
        { label: 'heat', value: plate.heatNumber === '' ? '–' : plate.heatNumber },
        { label: 'changed', value: momentText(plate.changedAt), share: 1.6 },
      ]}
    />
  );
}

function PlateFacts({ plate }: { readonly plate: Plate }) {
  const system = useUnitSystem();
  const size = (value: number | null) => (value === null ? '–' : quantityText(value, 'length', system).text);
  const { fields } = platesText;
  return (
    <Facts
      items={[
        { label: fields.surface, value: surfaceNames[plate.surface] },
        { label: fields.certificate, value: plate.certificate === '' ? '–' : plate.certificate },
        { label: fields.length, value: size(plate.length) },
        { label: fields.width, value: size(plate.width) },
      ]}
    />
  );
}
