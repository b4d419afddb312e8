import { useEffect, useId, useRef, type KeyboardEvent, type ReactNode } from 'react';
import { StyleSheet, View } from 'react-native';
import { roles } from '@/components/theme/roles.ts';
import { space } from '@/components/theme/space.ts';
import { webStyle } from '@/components/theme/web-style.ts';
import { Button } from '@/components/ui/button.tsx';
import { Row } from '@/components/ui/stack.tsx';
import { Heading } from '@/components/ui/text.tsx';

/** Share of the window's height that the sheet takes, %. */
const share = 46;

type BottomSheetProps = { title: string; closeLabel: string; onClose: () => void; children: ReactNode };

/**
 * A sheet over the lower part of a phone's window, beside which the page stays usable: the drawing above it is still moved and tapped. Escape and its
 * button close it; the focus goes into it and back to where it came from.
 */
export function BottomSheet({ title, closeLabel, onClose, children }: BottomSheetProps) {
  const id = useId();
  const sheet = useRef<View>(null);
  useEffect(() => {
    const before = document.activeElement;
    return () => {
      if (before instanceof HTMLElement && before.isConnected) before.focus({ preventScroll: true });
    };
  }, []);
  // what was pressed in it may have gone with what it led to
  useEffect(() => {
    const element = elementOf(sheet.current);
    if (!element?.contains(document.activeElement)) element?.focus({ preventScroll: true });
  }, [title]);
  const key = (event: KeyboardEvent<HTMLElement>) => {
    if (event.key !== 'Escape') return;
    event.stopPropagation();
    onClose();
  };
  return (
    <>
      <View ref={sheet} role="dialog" aria-labelledby={id} tabIndex={-1} onKeyDown={key} style={styles.sheet}>
        <View style={styles.head}>
          <Row justify="space-between" wrap={false}>
            <Heading level={2} id={id}>
              {title}
            </Heading>
            <Button kind="quiet" label={closeLabel} onPress={onClose} />
          </Row>
        </View>
        {/* it scrolls: keys must reach it even when there is nothing to press in it */}
        <View tabIndex={0} role="group" aria-labelledby={id} style={styles.body}>
          {children}
        </View>
      </View>
      {/* so that the page's end can be scrolled clear of the sheet */}
      <View style={webStyle({ height: `${share}dvh` })} />
    </>
  );
}

/** On the web a view's host is the page's own element. */
const elementOf = (host: unknown): HTMLElement | null => (host instanceof HTMLElement ? host : null);

const styles = StyleSheet.create({
  sheet: {
    backgroundColor: roles.sheet,
    borderTopWidth: 2,
    borderTopColor: roles.ink,
    ...webStyle({
      position: 'fixed',
      left: 0,
      right: 0,
      bottom: 0,
      zIndex: 8,
      height: `${share}dvh`,
      display: 'flex',
      flexDirection: 'column',
      outlineStyle: 'none',
    }),
  },
  head: { paddingHorizontal: space.l, paddingVertical: space.xs, borderBottomWidth: 1, borderBottomColor: roles.rule },
  body: {
    flexGrow: 1,
    flexShrink: 1,
    padding: space.l,
    gap: space.m,
    ...webStyle({ overflowY: 'auto', overscrollBehavior: 'contain', minHeight: 0 }),
  },
});
