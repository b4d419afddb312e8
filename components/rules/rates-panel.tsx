import { zodResolver } from '@hookform/resolvers/zod';
import { useQuery } from '@tanstack/react-query';
import { useEffect, useState } from 'react';
import { useForm, useWatch } from 'react-hook-form';
import { applyFieldProblems } from '@/components/data/field-problems.ts';
import { isProblem } from '@/components/data/problem.ts';
import { ratesQuery, useRatesChange } from '@/components/data/rates.ts';
import { momentText } from '@/components/text/moments.ts';
import { estimateText } from '@/components/text/plan-estimate.ts';
import { ratesText } from '@/components/text/rates.ts';
import { Button } from '@/components/ui/button.tsx';
import { Columns } from '@/components/ui/columns.tsx';
import { ConflictNotice } from '@/components/ui/conflict-notice.tsx';
import { ErrorNotice } from '@/components/ui/error-notice.tsx';
import { Facts } from '@/components/ui/facts.tsx';
import { FormNumber, FormText } from '@/components/ui/form-fields.tsx';
import { Form } from '@/components/ui/form.tsx';
import { Panel } from '@/components/ui/panel.tsx';
import { Progress } from '@/components/ui/progress.tsx';
import { Row, Stack } from '@/components/ui/stack.tsx';
import { Body, Small } from '@/components/ui/text.tsx';
import { givesRates, ratesFormSchema, type PlantRates, type RatesForm } from '@/shared/rates.ts';
import { quantityText } from '@/strategy/units/index.ts';

/** What the plant pays, for the lead to write: estimates say money with it. */
export function RatesPanel() {
  const rates = useQuery(ratesQuery());
  const [writing, setWriting] = useState(false);
  return (
    <Panel title={ratesText.title}>
      <Body>{ratesText.words}</Body>
      {rates.isPending ? (
        <Progress label={ratesText.fetching} />
      ) : rates.data === undefined ? (
        <ErrorNotice error={rates.error} onRetry={() => void rates.refetch()} />
      ) : writing ? (
        <RatesWriting
          start={rates.data}
          newest={async () => (await rates.refetch()).data ?? null}
          onDone={() => setWriting(false)}
        />
      ) : (
        <RatesShown rates={rates.data} onWrite={() => setWriting(true)} />
      )}
    </Panel>
  );
}

const amounts = ['machineHour', 'oxygenKilogram', 'electricityKilowattHour'] as const;

function RatesShown({ rates, onWrite }: { readonly rates: PlantRates; readonly onWrite: () => void }) {
  const given = givesRates(rates);
  return (
    <Stack>
      {given ? (
        <Facts
          items={[
            ...amounts.map((name) => ({
              label: ratesText.fields[name],
              value: rates[name] === null ? ratesText.notGiven : estimateText.amount(rates[name], rates.currency),
            })),
            {
              label: ratesText.fields.wallPlugEfficiency,
              value: quantityText(rates.wallPlugEfficiency, 'ratio', 'metric').text,
            },
          ]}
        />
      ) : (
        <Body strong>{ratesText.none}</Body>
      )}
      {rates.changedBy === null ? null : (
        <Small>{ratesText.changedBy(rates.changedBy.name, momentText(rates.changedAt))}</Small>
      )}
      <Row>
        <Button label={given ? ratesText.change : ratesText.give} onPress={onWrite} />
      </Row>
    </Stack>
  );
}

type WritingProps = {
  readonly start: PlantRates;
  /** The rates as they stand on the server. */
  readonly newest: () => Promise<PlantRates | null>;
  readonly onDone: () => void;
};

function RatesWriting({ start, newest, onDone }: WritingProps) {
  const change = useRatesChange();
  // The version that was seen when the writing began, whatever was fetched since.
  const [seen, setSeen] = useState(start);
  const form = useForm<RatesForm, unknown, RatesForm>({
    resolver: zodResolver(ratesFormSchema),
    mode: 'onTouched',
    defaultValues: formOf(start),
  });
  const { control, setError } = form;
  useEffect(() => {
    if (change.error !== null) applyFieldProblems(change.error, setError);
  }, [change.error, setError]);
  const currency = useWatch({ control, name: 'currency' }).trim();
  return (
    <Form
      label={ratesText.title}
      onSubmit={form.handleSubmit((given) => change.mutate({ seen, form: given }, { onSuccess: onDone }))}
    >
      <Columns>
        <FormText
          control={control}
          name="currency"
          label={ratesText.fields.currency}
          hint={ratesText.fields.currencyHint}
        />
        <FormNumber
          control={control}
          name="machineHour"
          dimension="ratio"
          unit="×"
          unitShown={currency}
          optional
          label={ratesText.fields.machineHour}
          hint={ratesText.fields.machineHourHint}
        />
        <FormNumber
          control={control}
          name="oxygenKilogram"
          dimension="ratio"
          unit="×"
          unitShown={currency}
          optional
          label={ratesText.fields.oxygenKilogram}
          hint={ratesText.fields.oxygenKilogramHint}
        />
        <FormNumber
          control={control}
          name="electricityKilowattHour"
          dimension="ratio"
          unit="×"
          unitShown={currency}
          optional
          label={ratesText.fields.electricityKilowattHour}
        />
        <FormNumber
          control={control}
          name="wallPlugEfficiency"
          dimension="ratio"
          label={ratesText.fields.wallPlugEfficiency}
          hint={ratesText.fields.wallPlugEfficiencyHint}
        />
      </Columns>
      {!change.isError ? null : isProblem(change.error, 'stale') ? (
        <ConflictNotice
          onLoad={() =>
            void newest().then((now) => {
              if (now !== null) setSeen(now);
              change.reset();
            })
          }
        />
      ) : (
        <ErrorNotice error={change.error} />
      )}
      <Row>
        <Button kind="main" submit label={ratesText.save} busy={change.isPending} />
        <Button kind="quiet" label={ratesText.cancel} onPress={onDone} />
      </Row>
    </Form>
  );
}

const formOf = ({
  currency,
  machineHour,
  oxygenKilogram,
  electricityKilowattHour,
  wallPlugEfficiency,
}: PlantRates): RatesForm => ({ currency, machineHour, oxygenKilogram, electricityKilowattHour, wallPlugEfficiency });
