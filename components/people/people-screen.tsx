import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { View } from 'react-native';
import { peopleQuery } from '@/components/data/people.ts';
import { useActor } from '@/components/shell/actor.tsx';
import { Page } from '@/components/shell/page.tsx';
import { peopleText } from '@/components/text/people.ts';
import { roleNames } from '@/components/text/shell.ts';
import { Button } from '@/components/ui/button.tsx';
import { Empty } from '@/components/ui/empty.tsx';
import { ErrorNotice } from '@/components/ui/error-notice.tsx';
import { Rows } from '@/components/ui/link-row.tsx';
import { Progress } from '@/components/ui/progress.tsx';
import { Row, Stack } from '@/components/ui/stack.tsx';
import { Body, Heading, Small } from '@/components/ui/text.tsx';
import type { Member } from '@/shared/people.ts';
import { PersonChangeDialog } from './person-change-dialog.tsx';
import { RolesPanel } from './roles-panel.tsx';
import { PersonNewDialog } from './person-new-dialog.tsx';

/** Who may do what in this plant. */
export function PeopleScreen() {
  const people = useQuery(peopleQuery());
  const [adding, setAdding] = useState(false);
  const [changingId, setChangingId] = useState<string | null>(null);
  const here = people.data?.filter((member) => member.endedAt === null) ?? [];
  const ended = people.data?.filter((member) => member.endedAt !== null) ?? [];
  const changing = people.data?.find((member) => member.id === changingId);
  const add = <Button kind="main" label={peopleText.add} onPress={() => setAdding(true)} />;

  return (
    <Page title={peopleText.title} actions={add} aside={<RolesPanel />}>
      {people.isPending ? (
        <Progress label={peopleText.fetching} />
      ) : people.data === undefined ? (
        <ErrorNotice error={people.error} onRetry={() => void people.refetch()} />
      ) : here.length === 0 ? (
        <Empty title={peopleText.empty.title}>{peopleText.empty.words}</Empty>
      ) : (
        <Rows label={peopleText.list}>
          {here.map((member) => (
            <MemberRow key={member.id} member={member} onChange={() => setChangingId(member.id)} />
          ))}
        </Rows>
      )}
      {ended.length === 0 ? null : (
        <Stack>
          <Heading level={2}>{peopleText.ended}</Heading>
          <Rows label={peopleText.ended}>
            {ended.map((member) => (
              <MemberRow key={member.id} member={member} onChange={() => setChangingId(member.id)} />
            ))}
          </Rows>
        </Stack>
      )}
      {adding ? <PersonNewDialog onClose={() => setAdding(false)} /> : null}
      {changing === undefined ? null : (
        <PersonChangeDialog
          key={changing.id}
          member={changing}
          onLoadNewest={() => people.refetch()}
          onClose={() => setChangingId(null)}
        />
      )}
    </Page>
  );
}

function MemberRow({ member, onChange }: { readonly member: Member; readonly onChange: () => void }) {
  const actor = useActor();
  const words = [
    roleNames[member.role],
    ...(member.mayApprove ? [peopleText.grant] : []),
    ...(actor?.userId === member.userId ? [peopleText.you] : []),
  ];
  return (
    <View style={{ paddingVertical: 12, paddingHorizontal: 4 }}>
      <Row justify="space-between">
        <Stack gap="hair" grow>
          <Body strong>{member.name}</Body>
          <Body>{words.join(', ')}</Body>
          <Small>{member.mail}</Small>
        </Stack>
        <Button label={peopleText.change} spoken={peopleText.changeOf(member.name)} onPress={onChange} />
      </Row>
    </View>
  );
}
