import { useRouter } from 'expo-router';
import { useChoosePlant, useSignOut } from '@/components/data/sessions.ts';
import { roleNames, shell } from '@/components/text/shell.ts';
import { chooseTheme, themeChoices, useThemeChoice } from '@/components/theme/choice.ts';
import { Button } from '@/components/ui/button.tsx';
import { Choice } from '@/components/ui/choice.tsx';
import { Divider } from '@/components/ui/divider.tsx';
import { ErrorNotice } from '@/components/ui/error-notice.tsx';
import { Stack } from '@/components/ui/stack.tsx';
import { Body, Small } from '@/components/ui/text.tsx';
import { chooseUnitSystem, useUnitSystem } from '@/components/ui/unit-system.ts';
import type { Session } from '@/shared/sessions.ts';

/** Who is signed in, in which plant, and how this device shows things. */
export function Settings({ session, onDone }: { readonly session: Session; readonly onDone: () => void }) {
  const theme = useThemeChoice();
  const units = useUnitSystem();
  const plant = useChoosePlant();
  const signOut = useSignOut();
  const router = useRouter();
  return (
    <Stack gap="l">
      <Stack gap="hair">
        <Body strong>{session.user.name}</Body>
        <Small>{`${roleNames[session.role]}, ${session.plant.name}`}</Small>
        <Small>{session.user.mail}</Small>
      </Stack>
      {session.memberships.length < 2 ? null : (
        <Choice
          label={shell.plant}
          kind="radios"
          options={session.memberships.map((one) => ({
            value: one.plantId,
            label: one.plantName,
            hint: roleNames[one.role],
          }))}
          value={session.plant.id}
          onChange={(plantId) =>
            plant.mutate(plantId, {
              onSuccess: () => {
                onDone();
                router.replace('/');
              },
            })
          }
          disabled={plant.isPending}
        />
      )}
      {plant.isError ? <ErrorNotice error={plant.error} /> : null}
      <Choice
        label={shell.theme}
        options={themeChoices.map((value) => ({ value, label: shell.themes[value] }))}
        value={theme}
        onChange={chooseTheme}
      />
      <Choice
        label={shell.units}
        options={[
          { value: 'metric', label: shell.unitSystems.metric },
          { value: 'inch', label: shell.unitSystems.inch },
        ]}
        value={units}
        onChange={chooseUnitSystem}
      />
      <Divider />
      {signOut.isError ? <ErrorNotice error={signOut.error} /> : null}
      <Button
        label={shell.signOut}
        busy={signOut.isPending}
        fill
        onPress={() =>
          signOut.mutate(undefined, {
            onSuccess: () => {
              onDone();
              router.replace('/sign-in');
            },
          })
        }
      />
    </Stack>
  );
}
