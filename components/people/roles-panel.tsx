import { peopleText } from '@/components/text/people.ts';
import { roleDeeds, roleNames } from '@/components/text/shell.ts';
import { Panel } from '@/components/ui/panel.tsx';
import { Stack } from '@/components/ui/stack.tsx';
import { Body, Small } from '@/components/ui/text.tsx';
import { roles } from '@/shared/policy.ts';

/** What each role gets done, for whoever gives one to somebody. */
export function RolesPanel() {
  return (
    <Panel title={peopleText.roles}>
      {roles.map((role) => (
        <Stack key={role} gap="hair">
          <Body strong>{roleNames[role]}</Body>
          <Small>{roleDeeds[role]}</Small>
        </Stack>
      ))}
    </Panel>
  );
}
