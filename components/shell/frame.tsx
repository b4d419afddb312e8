import { useQuery } from '@tanstack/react-query';
import { usePathname } from 'expo-router';
import { useEffect, useRef, useState, type ReactNode } from 'react';
import { Pressable, View } from 'react-native';
import { cornerPlanQuery } from '@/components/data/corner-plans.ts';
import { actorOf } from '@/components/data/sessions.ts';
import { common } from '@/components/text/common.ts';
import { roleNames, shell } from '@/components/text/shell.ts';
import { useLayout } from '@/components/theme/layout.ts';
import { roles } from '@/components/theme/roles.ts';
import { family } from '@/components/theme/type.ts';
import { webStyle } from '@/components/theme/web-style.ts';
import { Button } from '@/components/ui/button.tsx';
import { Dialog } from '@/components/ui/dialog.tsx';
import { Divider } from '@/components/ui/divider.tsx';
import { PlainLink } from '@/components/ui/link.tsx';
import { NotPrinted } from '@/components/ui/not-printed.tsx';
import { Words } from '@/components/ui/words.tsx';
import type { Session } from '@/shared/sessions.ts';
import { useSession } from './actor.tsx';
import { Brand } from './brand.tsx';
import { ExpiredDialog } from './expired-dialog.tsx';
import { isWithin, placesOf } from './places.ts';
import { Settings } from './settings.tsx';

/** What stands around every page: a rail on a wide screen, a bar with a menu on a phone; neither for a stranger. */
export function Frame({ children }: { readonly children: ReactNode }) {
  const session = useSession() ?? null;
  const { wide } = useLayout();
  const pathname = usePathname();
  const main = useRef<View>(null);
  const shown = useRef(pathname);

  // After going to another page the reading begins there, not at the link that was followed.
  useEffect(() => {
    if (shown.current === pathname) return;
    shown.current = pathname;
    main.current?.focus();
    window.scrollTo(0, 0);
  }, [pathname]);

  return (
    <View style={[styles.frame, { flexDirection: wide ? 'row' : 'column' }]}>
      <View href="#content" dataSet={{ look: 'skip' }}>
        <Words>{shell.skip}</Words>
      </View>
      <NotPrinted>
        {session === null ? null : wide ? (
          <Rail session={session} pathname={pathname} />
        ) : (
          <Bar session={session} pathname={pathname} />
        )}
      </NotPrinted>
      <View role="main" id="content" ref={main} tabIndex={-1} style={wide ? styles.beside : styles.below}>
        {children}
      </View>
      {session === null ? null : <ExpiredDialog session={session} />}
    </View>
  );
}

type Around = { readonly session: Session; readonly pathname: string };

function Rail({ session, pathname }: Around) {
  const [open, setOpen] = useState(false);
  return (
    <View role="banner" style={styles.rail}>
      <Brand />
      <Places session={session} pathname={pathname} />
      <View style={{ marginTop: 'auto', paddingTop: 24 }}>
        <Pressable
          role="button"
          aria-haspopup="dialog"
          dataSet={{ look: 'button quiet' }}
          style={styles.you}
          onPress={() => setOpen(true)}
        >
          <Words>{session.user.name}</Words>
          <Words style={styles.whose}>{`${roleNames[session.role]}, ${session.plant.name}`}</Words>
        </Pressable>
      </View>
      <Dialog title={shell.you} open={open} onClose={() => setOpen(false)} closeLabel={common.close}>
        <Settings session={session} onDone={() => setOpen(false)} />
      </Dialog>
    </View>
  );
}

function Bar({ session, pathname }: Around) {
  const [open, setOpen] = useState(false);
  const close = () => setOpen(false);
  return (
    <View role="banner" style={styles.bar}>
      <Brand />
      <Button kind="quiet" mark="menu" label={shell.menu} expanded={open} onPress={() => setOpen(true)} />
      <Dialog title={shell.menu} open={open} onClose={close} closeLabel={shell.closeMenu}>
        <Places session={session} pathname={pathname} onGo={close} />
        <Divider />
        <Settings session={session} onDone={close} />
      </Dialog>
    </View>
  );
}

/** The address that says where in the pages one is: a corner plan is of a part or of a layout, which only the plan itself knows. */
function useStandsFor(pathname: string): string {
  const planId = /^\/corner-plans\/([^/]+)/.exec(pathname)?.[1] ?? '';
  // the page asks for the plan; here it is only looked at
  const { data: plan } = useQuery({ ...cornerPlanQuery(planId), enabled: false });
  return plan?.layout ? `/layouts/${plan.layout.id}` : pathname;
}

function Places({ session, pathname, onGo }: Around & { readonly onGo?: () => void }) {
  const standsFor = useStandsFor(pathname);
  return (
    <View role="navigation" aria-label={shell.navigation}>
      <View role="list">
        {placesOf(actorOf(session)).map((place) => {
          const here = isWithin(standsFor, place.path);
          return (
            <View key={place.path} role="listitem">
              <PlainLink href={place.href} current={here} onFollow={onGo} look="row" style={styles.place}>
                <Words
                  style={{
                    fontFamily: here ? family.readingStrong : family.reading,
                    fontSize: 17,
                    lineHeight: 24,
                    color: here ? roles.ember : roles.ink,
                  }}
                >
                  {`${here ? '– ' : ''}${place.name}`}
                </Words>
              </PlainLink>
            </View>
          );
        })}
      </View>
    </View>
  );
}

// plain objects: they are written on the element itself, above what the stylesheet says of a button
const styles = {
  frame: { flexGrow: 1, ...webStyle({ minHeight: '100dvh' }), backgroundColor: roles.ground },
  beside: { flexGrow: 1, flexShrink: 1, flexBasis: 0, minWidth: 0 },
  below: { flexGrow: 1 },
  rail: {
    position: 'sticky',
    top: 0,
    width: 176,
    ...webStyle({ height: '100dvh' }),
    overflowY: 'auto',
    gap: 20,
    paddingTop: 20,
    paddingRight: 8,
    paddingBottom: 16,
    paddingLeft: 20,
  },
  bar: {
    position: 'sticky',
    top: 0,
    zIndex: 10,
    flexDirection: 'row',
    alignItems: 'center',
    justifyContent: 'space-between',
    paddingVertical: 4,
    paddingRight: 6,
    paddingLeft: 16,
    backgroundColor: roles.ground,
    borderBottomWidth: 1,
    borderBottomColor: roles.rule,
  },
  place: { flexDirection: 'row', alignItems: 'center', minHeight: 48, paddingLeft: 2 },
  you: {
    flexDirection: 'column',
    alignItems: 'flex-start',
    width: '100%',
    paddingVertical: 8,
    paddingHorizontal: 2,
    ...webStyle({ textAlign: 'left', textDecorationLine: 'none' }),
  },
  whose: { fontFamily: family.reading, fontSize: 14, lineHeight: 18, color: roles.softInk },
} as const;
