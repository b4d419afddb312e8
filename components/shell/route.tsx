import { useLocalSearchParams } from 'expo-router';
import Head from 'expo-router/head';
import type { ReactNode } from 'react';
import { common } from '@/components/text/common.ts';
import { idSchema } from '@/shared/basics.ts';
import type { Action } from '@/shared/policy.ts';
import { RequireActor } from './actor.tsx';
import { NothingHere } from './nothing-here.tsx';

/** The name of the page in the browser's tab. */
export function Title({ text }: { readonly text: string }) {
  return (
    <Head>
      <title>{`${text} – ${common.product}`}</title>
    </Head>
  );
}

/** A page of the product: its title, and who may open it. */
export function Route({
  title,
  action,
  children,
}: {
  readonly title: string;
  readonly action: Action;
  readonly children: ReactNode;
}) {
  return (
    <>
      <Title text={title} />
      <RequireActor action={action}>{children}</RequireActor>
    </>
  );
}

/** A page that an id in its address names. A malformed one names nothing, and the server is not asked. */
export function RouteOf({
  title,
  action,
  children,
}: {
  readonly title: string;
  readonly action: Action;
  readonly children: (id: string) => ReactNode;
}) {
  const id = idSchema.safeParse(useTextParam('id'));
  return (
    <Route title={title} action={action}>
      {/* the key: a page of another id begins afresh, with its own form and view */}
      {id.success ? <Begun key={id.data}>{children(id.data)}</Begun> : <NothingHere />}
    </Route>
  );
}

function Begun({ children }: { readonly children: ReactNode }) {
  return children;
}

/** A parameter of the address; null when it is missing, the first when it is given twice. */
export function useTextParam(name: string): string | null {
  const params: Record<string, string | string[] | undefined> = useLocalSearchParams();
  const value = params[name];
  const first = Array.isArray(value) ? value[0] : value;
  return first === undefined || first === '' ? null : first;
}
