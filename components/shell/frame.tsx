import { usePathname } from 'expo-router';
import { useEffect, useRef, useState, type CSSProperties, type ReactNode } from 'react';
import { actorOf } from '@/components/data/sessions.ts';
import { common } from '@/components/text/common.ts';
import { roleNames, shell } from '@/components/text/shell.ts';
import { useLayout } from '@/components/theme/layout.ts';
import { roles } from '@/components/theme/roles.ts';
import { family } from '@/components/theme/type.ts';
import { Button } from '@/components/ui/button.tsx';
import { Dialog } from '@/components/ui/dialog.tsx';
import { Divider } from '@/components/ui/divider.tsx';
import { PlainLink } from '@/components/ui/link.tsx';
import { NotPrinted } from '@/components/ui/not-printed.tsx';
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
  const main = useRef<HTMLElement>(null);
  const shown = useRef(pathname);

  // After going to another page the reading begins there, not at the link that was followed.
  useEffect(() => {
    if (shown.current === pathname) return;
    shown.current = pathname;
    main.current?.focus({ preventScroll: true });
    window.scrollTo(0, 0);
  }, [pathname]);

  return (
    <div style={{ ...styles.frame, flexDirection: wide ? 'row' : 'column' }}>
      <a href="#content" className="cp-skip">
        {shell.skip}
      </a>
      <NotPrinted>
        {session === null ? null : wide ? (
          <Rail session={session} pathname={pathname} />
        ) : (
          <Bar session={session} pathname={pathname} />
        )}
      </NotPrinted>
      <main id="content" ref={main} tabIndex={-1} style={styles.main}>
        {children}
      </main>
      {session === null ? null : <ExpiredDialog session={session} />}
    </div>
  );
}

type Around = { readonly session: Session; readonly pathname: string };

function Rail({ session, pathname }: Around) {
  const [open, setOpen] = useState(false);
  return (
    <header style={styles.rail}>
      <Brand />
      <Places session={session} pathname={pathname} />
      <div style={{ marginTop: 'auto', paddingTop: 24 }}>
        <button
          type="button"
          aria-haspopup="dialog"
          className="cp-button cp-quiet"
          style={styles.you}
          onClick={() => setOpen(true)}
        >
          <span style={{ display: 'block' }}>{session.user.name}</span>
          <span style={styles.whose}>{`${roleNames[session.role]}, ${session.plant.name}`}</span>
        </button>
      </div>
      <Dialog title={shell.you} open={open} onClose={() => setOpen(false)} closeLabel={common.close}>
        <Settings session={session} onDone={() => setOpen(false)} />
      </Dialog>
    </header>
  );
}

function Bar({ session, pathname }: Around) {
  const [open, setOpen] = useState(false);
  const close = () => setOpen(false);
  return (
    <header style={styles.bar}>
      <Brand />
      <Button kind="quiet" mark="menu" label={shell.menu} expanded={open} onPress={() => setOpen(true)} />
      <Dialog title={shell.menu} open={open} onClose={close} closeLabel={shell.closeMenu}>
        <Places session={session} pathname={pathname} onGo={close} />
        <Divider />
        <Settings session={session} onDone={close} />
      </Dialog>
    </header>
  );
}

function Places({ session, pathname, onGo }: Around & { readonly onGo?: () => void }) {
  return (
    <nav aria-label={shell.navigation}>
      <ul style={{ listStyle: 'none', margin: 0, padding: 0 }}>
        {placesOf(actorOf(session)).map((place) => {
          const here = isWithin(pathname, place.path);
          return (
            <li key={place.path}>
              <PlainLink
                href={place.href}
                current={here}
                onFollow={onGo}
                className="cp-row"
                style={{
                  ...styles.place,
                  color: here ? roles.ember : roles.ink,
                  fontFamily: here ? family.readingStrong : family.reading,
                }}
              >
                {here ? '– ' : ''}
                {place.name}
              </PlainLink>
            </li>
          );
        })}
      </ul>
    </nav>
  );
}

const styles = {
  frame: { display: 'flex', flex: '1 0 auto', minHeight: '100dvh', background: roles.ground, position: 'relative' },
  main: { flex: '1 1 0', minWidth: 0, display: 'flex', flexDirection: 'column', outline: 'none' },
  rail: {
    position: 'sticky',
    top: 0,
    flex: 'none',
    width: 176,
    height: '100dvh',
    overflowY: 'auto',
    display: 'flex',
    flexDirection: 'column',
    gap: 20,
    padding: '20px 8px 16px 20px',
  },
  bar: {
    position: 'sticky',
    top: 0,
    zIndex: 10,
    display: 'flex',
    alignItems: 'center',
    justifyContent: 'space-between',
    padding: '4px 6px 4px 16px',
    background: roles.ground,
    borderBottom: `1px solid ${roles.rule}`,
  },
  place: { display: 'flex', alignItems: 'center', minHeight: 48, fontSize: 17, lineHeight: '24px', paddingLeft: 2 },
  you: { textAlign: 'left', width: '100%', padding: '8px 2px', textDecoration: 'none' },
  whose: { display: 'block', fontFamily: family.reading, fontSize: 14, lineHeight: '18px', color: roles.softInk },
} as const satisfies Record<string, CSSProperties>;
