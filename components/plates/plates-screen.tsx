import { useQuery } from '@tanstack/react-query';
import { useDeferredValue, useState } from 'react';
import { platesQuery } from '@/components/data/plates.ts';
import { useActor } from '@/components/shell/actor.tsx';
import { Page } from '@/components/shell/page.tsx';
import { platesText, surfaceNames } from '@/components/text/plates.ts';
import { thicknessText } from '@/components/text/thickness.ts';
import { Empty } from '@/components/ui/empty.tsx';
import { ErrorNotice } from '@/components/ui/error-notice.tsx';
import { LinkRow, Rows } from '@/components/ui/link-row.tsx';
import { ButtonLink } from '@/components/ui/link.tsx';
import { Progress } from '@/components/ui/progress.tsx';
import { Body, Figure, Heading, Small } from '@/components/ui/text.tsx';
import { TextField } from '@/components/ui/text-field.tsx';
import { useUnitSystem } from '@/components/ui/unit-system.ts';
import { limits } from '@/shared/limits.ts';
import type { Plate } from '@/shared/plates.ts';
import { may } from '@/shared/policy.ts';
import { quantityText, type UnitSystem } from '@/strategy/units/index.ts';

/** Plates in the yard, found by their tag. */
export function PlatesScreen() {
  const [typed, setTyped] = useState('');
  const tag = useDeferredValue(typed).trim().slice(0, limits.tag);
  const plates = useQuery(platesQuery(tag));
  const actor = useActor();
  const system = useUnitSystem();
  const add =
    actor !== null && may(actor, 'plate.write') ? (
      <ButtonLink kind="main" href="/plates/new" label={platesText.add} />
    ) : undefined;

  return (
    <Page title={platesText.title} actions={add} measure="reading">
      <TextField
        label={platesText.search}
        hint={platesText.searchHint}
        kind="search"
        value={typed}
        onChange={setTyped}
      />
      {plates.isPending ? (
        <Progress label={platesText.fetching} />
      ) : plates.data === undefined ? (
        <ErrorNotice error={plates.error} onRetry={() => void plates.refetch()} />
      ) : plates.data.length === 0 && tag === '' ? (
        <Empty title={platesText.empty.title} action={add}>
          {platesText.empty.words}
        </Empty>
      ) : plates.data.length === 0 ? (
        <Empty title={platesText.noneFound(tag)}>{platesText.noneFoundWords}</Empty>
      ) : (
        <Rows label={platesText.list}>
          {plates.data.map((plate) => (
            <PlateRow key={plate.id} plate={plate} system={system} />
          ))}
        </Rows>
      )}
    </Page>
  );
}

function PlateRow({ plate, system }: { readonly plate: Plate; readonly system: UnitSystem }) {
  const nominal = quantityText(plate.nominalThickness * 1e-6, 'length', system);
  const more = [
    ...(plate.heatNumber === '' ? [] : [platesText.heat(plate.heatNumber)]),
    ...(plate.measuredThickness === null ? [] : [platesText.measured(thicknessText(plate.measuredThickness, system))]),
  ];
  return (
    <LinkRow href={`/plates/${plate.id}`} right={<Figure value={nominal.number} unit={nominal.unit} />}>
      <Heading level={2} look={3}>
        {plate.tag}
      </Heading>
      <Body>{`${plate.grade.name}, ${surfaceNames[plate.surface].toLowerCase()}`}</Body>
      {more.length === 0 ? null : <Small>{more.join(', ')}</Small>}
    </LinkRow>
  );
}
