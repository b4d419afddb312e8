import { zodResolver } from '@hookform/resolvers/zod';
import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { useForm } from 'react-hook-form';
import { z } from 'zod';
import { newId } from '@/components/data/call.ts';
import { applyFieldProblems } from '@/components/data/field-problems.ts';
import { nozzlesQuery, useNozzleAdd } from '@/components/data/nozzles.ts';
import { useActor } from '@/components/shell/actor.tsx';
import { common } from '@/components/text/common.ts';
import { nozzleText } from '@/components/text/machines.ts';
import { Button } from '@/components/ui/button.tsx';
import { ErrorNotice } from '@/components/ui/error-notice.tsx';
import { Facts } from '@/components/ui/facts.tsx';
import { FormChoice, FormNumber, FormText } from '@/components/ui/form-fields.tsx';
import { Form } from '@/components/ui/form.tsx';
import { Panel } from '@/components/ui/panel.tsx';
import { Progress } from '@/components/ui/progress.tsx';
import { Row } from '@/components/ui/stack.tsx';
import { Small } from '@/components/ui/text.tsx';
import { useUnitSystem } from '@/components/ui/unit-system.ts';
import { nameSchema } from '@/shared/basics.ts';
import { nozzleFormSchema } from '@/shared/machines.ts';
import { may } from '@/shared/policy.ts';
import { quantityText } from '@/strategy/units/index.ts';

/** Nozzles in the drawer. */
export function NozzlesSection() {
  const nozzles = useQuery(nozzlesQuery());
  const actor = useActor();
  const system = useUnitSystem();
  const [adding, setAdding] = useState(false);
  return (
    <Panel title={nozzleText.title}>
      {nozzles.isPending ? (
        <Progress label={nozzleText.fetching} />
      ) : nozzles.data === undefined ? (
        <ErrorNotice error={nozzles.error} onRetry={() => void nozzles.refetch()} />
      ) : nozzles.data.length === 0 ? (
        <Small>{nozzleText.empty}</Small>
      ) : (
        <Facts
          items={nozzles.data.map((nozzle) => ({
            label: nozzle.name,
            value: `${nozzleText.types[nozzle.type]}, ${quantityText(nozzle.diameter, 'length', system).text}`,
          }))}
        />
      )}
      {actor === null || !may(actor, 'nozzle.write') ? null : adding ? (
        <NozzleForm onDone={() => setAdding(false)} />
      ) : (
        <Button label={nozzleText.add} onPress={() => setAdding(true)} />
      )}
    </Panel>
  );
}

const types = ['single', 'double'] as const;
const formSchema = z.object({ name: nameSchema, ...nozzleFormSchema.shape });

function NozzleForm({ onDone }: { readonly onDone: () => void }) {
  const add = useNozzleAdd();
  const [id] = useState(newId);
  const form = useForm({
    resolver: zodResolver(formSchema),
    mode: 'onTouched',
    defaultValues: { name: '', type: 'double' },
  });
  return (
    <Form
      label={nozzleText.add}
      onSubmit={form.handleSubmit((given) =>
        add.mutate(
          { id, ...given },
          { onSuccess: onDone, onError: (error) => applyFieldProblems(error, form.setError) },
        ),
      )}
    >
      <FormText control={form.control} name="name" label={nozzleText.name} hint={nozzleText.nameHint} />
      <FormChoice
        control={form.control}
        name="type"
        label={nozzleText.type}
        options={types.map((value) => ({ value, label: nozzleText.types[value] }))}
      />
      <FormNumber control={form.control} name="diameter" dimension="length" label={nozzleText.diameter} />
      {add.isError ? <ErrorNotice error={add.error} /> : null}
      <Row>
        <Button kind="main" label={nozzleText.add} submit busy={add.isPending} />
        <Button label={common.cancel} onPress={onDone} />
      </Row>
    </Form>
  );
}
