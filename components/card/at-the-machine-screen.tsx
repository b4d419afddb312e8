import { useQuery } from '@tanstack/react-query';
import { useRouter } from 'expo-router';
import { useState } from 'react';
import { machinesQuery } from '@/components/data/machines.ts';
import { Page } from '@/components/shell/page.tsx';
import { atTheMachineText } from '@/components/text/card.ts';
import { common } from '@/components/text/common.ts';
import { Button } from '@/components/ui/button.tsx';
import { Divider } from '@/components/ui/divider.tsx';
import { Empty } from '@/components/ui/empty.tsx';
import { ErrorNotice } from '@/components/ui/error-notice.tsx';
import { Form } from '@/components/ui/form.tsx';
import { Progress } from '@/components/ui/progress.tsx';
import { Row, Stack } from '@/components/ui/stack.tsx';
import { Heading } from '@/components/ui/text.tsx';
import { TextField } from '@/components/ui/text-field.tsx';
import { tagSchema } from '@/shared/plates.ts';
import { cardAddress } from './card-address.ts';
import { PlateByHand } from './plate-by-hand.tsx';
import { rememberedMachine, rememberMachine } from './remembered-machine.ts';

/** Plate on the table, phone in a glove: which machine, which plate, and then its card. */
export function AtTheMachineScreen() {
  const router = useRouter();
  const machines = useQuery(machinesQuery());
  const [machineId, setMachine] = useState(rememberedMachine);
  const [choosing, setChoosing] = useState(false);
  const [tag, setTag] = useState('');
  const [sent, setSent] = useState(false);
  const [byHand, setByHand] = useState(false);

  if (!machines.data) {
    return (
      <Page title={atTheMachineText.title} measure="reading">
        {machines.isError ? (
          <ErrorNotice error={machines.error} onRetry={() => void machines.refetch()} />
        ) : (
          <Progress label={common.loading} />
        )}
      </Page>
    );
  }
  const only = machines.data.length === 1 ? machines.data[0] : undefined;
  const machine = machines.data.find(({ id }) => id === machineId) ?? only;
  const read = tagSchema.safeParse(tag);

  if (machines.data.length === 0) {
    return (
      <Page title={atTheMachineText.title} measure="reading">
        <Empty title={atTheMachineText.noMachines}>{atTheMachineText.noMachinesHint}</Empty>
      </Page>
    );
  }
  if (!machine || choosing) {
    return (
      <Page title={atTheMachineText.machine} eyebrow={atTheMachineText.title} measure="reading">
        <Stack gap="m">
          {machines.data.map(({ id, name }) => (
            <Button
              key={id}
              size="gloved"
              fill
              label={name}
              onPress={() => {
                setMachine(id);
                rememberMachine(id);
                setChoosing(false);
              }}
            />
          ))}
        </Stack>
      </Page>
    );
  }
  return (
    <Page title={atTheMachineText.title} measure="reading">
      <Row justify="space-between">
        <Heading level={2}>{machine.name}</Heading>
        {machines.data.length > 1 && (
          <Button size="large" label={atTheMachineText.otherMachine} onPress={() => setChoosing(true)} />
        )}
      </Row>
      <Divider strong />
      {byHand ? (
        <PlateByHand
          onPlate={(gradeGroup, thickness) =>
            router.push(cardAddress({ machineId: machine.id, tag: null, gradeGroup, thickness }))
          }
        />
      ) : (
        <Form
          label={atTheMachineText.tag}
          onSubmit={() => {
            setSent(true);
            if (!read.success) return;
            router.push(cardAddress({ machineId: machine.id, tag: read.data, gradeGroup: null, thickness: null }));
          }}
        >
          <TextField
            large
            label={atTheMachineText.tag}
            hint={atTheMachineText.tagHint}
            value={tag}
            onChange={setTag}
            autoCapitalize="characters"
            error={sent && !read.success ? atTheMachineText.missing.tag : undefined}
          />
          <Button kind="main" size="gloved" fill submit label={atTheMachineText.show} />
        </Form>
      )}
      <Button
        size="large"
        fill
        label={byHand ? atTheMachineText.withTag : atTheMachineText.noTag}
        onPress={() => setByHand(!byHand)}
      />
    </Page>
  );
}
