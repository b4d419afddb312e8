import { useQuery } from '@tanstack/react-query';
import { Redirect, usePathname } from 'expo-router';
import type { ReactNode } from 'react';
import { actorOf, sessionQuery } from '@/components/data/sessions.ts';
import { shell } from '@/components/text/shell.ts';
import { useMounted } from '@/components/theme/layout.ts';
import { ErrorNotice } from '@/components/ui/error-notice.tsx';
import { Notice } from '@/components/ui/notice.tsx';
import { Progress } from '@/components/ui/progress.tsx';
import { can, type Action, type Actor } from '@/shared/policy.ts';
import type { Session } from '@/shared/sessions.ts';
import { Page } from './page.tsx';

/** The sign-in as far as it is known; null for nobody, undefined until it is known. */
export function useSession(): Session | null | undefined {
  const session = useQuery(sessionQuery());
  const mounted = useMounted();
  return mounted ? session.data : undefined;
}

/** Who is signed in, as the policy asks for it; null for nobody or not known yet. */
export function useActor(): Actor | null {
  const session = useSession();
  return session === null || session === undefined ? null : actorOf(session);
}

/** Shows a page to who may see it. A comfort: the server is the lock. */
export function RequireActor({ action, children }: { readonly action: Action; readonly children: ReactNode }) {
  const session = useQuery(sessionQuery());
  const mounted = useMounted();
  const pathname = usePathname();

  if (!mounted || session.isPending) {
    return (
      <Page>
        <Progress label={shell.fetchingYou} />
      </Page>
    );
  }
  if (session.data === undefined) {
    return (
      <Page>
        <ErrorNotice error={session.error} onRetry={() => void session.refetch()} />
      </Page>
    );
  }
  if (session.data === null) {
    const next = `${pathname}${window.location.search}`;
    return <Redirect href={{ pathname: '/sign-in', params: pathname === '/' ? {} : { next } }} />;
  }
  const verdict = can(actorOf(session.data), action);
  // One's own work does not close a page: the decision there says so itself.
  if (!verdict.ok && verdict.code === 'not-allowed') {
    return (
      <Page title={shell.refused}>
        <Notice kind="plain">{verdict.why}</Notice>
      </Page>
    );
  }
  return children;
}
