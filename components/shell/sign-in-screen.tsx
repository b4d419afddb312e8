import { useQuery } from '@tanstack/react-query';
import { Redirect } from 'expo-router';
import { useState } from 'react';
import { View } from 'react-native';
import { actorOf, welcomeQuery } from '@/components/data/sessions.ts';
import { common } from '@/components/text/common.ts';
import { signInText } from '@/components/text/sign-in.ts';
import { useLayout } from '@/components/theme/layout.ts';
import { space } from '@/components/theme/space.ts';
import { EstimateNote } from '@/components/ui/estimate-note.tsx';
import { Panel } from '@/components/ui/panel.tsx';
import { Stack } from '@/components/ui/stack.tsx';
import { Body, Heading, Small } from '@/components/ui/text.tsx';
import type { Session } from '@/shared/sessions.ts';
import { useSession } from './actor.tsx';
import { BrandMark } from './brand.tsx';
import { DemoAccounts, type DemoAccount } from './demo-accounts.tsx';
import { startOf, wayBack } from './places.ts';
import { SignInForm } from './sign-in-form.tsx';

/** The door. On a demo it shows the accounts; a tap fills the form. */
export function SignInScreen({ next }: { readonly next: string | null }) {
  const session = useSession();
  const welcome = useQuery(welcomeQuery());
  const { wide } = useLayout();
  const [chosen, setChosen] = useState<DemoAccount | null>(null);
  const demo = welcome.data?.demo ?? null;

  if (session !== null && session !== undefined) return <Redirect href={after(session, next)} />;
  return (
    <View
      style={{
        width: '100%',
        maxWidth: wide && demo !== null ? 980 : 480,
        alignSelf: 'center',
        padding: space.l,
        paddingTop: wide ? 72 : space.xl,
        gap: space.xl,
      }}
    >
      <View style={{ flexDirection: 'row', gap: space.l, alignItems: 'center' }}>
        <BrandMark size={64} />
        <View style={{ flex: 1, gap: space.xs }}>
          <Heading level={1}>{common.product}</Heading>
          <Body tone="softInk">{signInText.pitch}</Body>
        </View>
      </View>
      <View
        style={{ flexDirection: wide ? 'row' : 'column', gap: space.xl, alignItems: wide ? 'flex-start' : 'stretch' }}
      >
        <View style={{ flexGrow: 1, flexShrink: 1, flexBasis: wide ? 0 : 'auto' }}>
          <Panel title={signInText.title}>
            <SignInForm
              mail={chosen?.mail}
              password={chosen === null ? undefined : demo?.password}
              onDone={() => undefined} // the session is known now, and the redirect above follows
            />
            <Small>{signInText.help}</Small>
          </Panel>
        </View>
        {demo === null ? null : (
          <View style={{ flexGrow: 1, flexShrink: 1, flexBasis: wide ? 0 : 'auto' }}>
            <Stack>
              <Heading level={2}>{signInText.demo}</Heading>
              <Small>{signInText.demoHint(demo.password)}</Small>
              <DemoAccounts accounts={demo.accounts} chosen={chosen?.mail ?? null} onChoose={setChosen} />
            </Stack>
          </View>
        )}
      </View>
      <EstimateNote />
    </View>
  );
}

const after = (session: Session, next: string | null) => wayBack(next) ?? startOf(actorOf(session));
