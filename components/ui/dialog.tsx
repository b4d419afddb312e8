import { useId, useLayoutEffect, useRef, type ReactNode } from 'react';
import { space } from '@/components/theme/space.ts';
import { Button } from './button.tsx';
import { Row, Stack } from './stack.tsx';
import { Heading } from './text.tsx';

/** A dialog over the page: the browser keeps the focus inside and gives it back. */
export function Dialog({
  title,
  open,
  onClose,
  children,
  actions,
  closable = true,
  closeLabel = 'Not now',
}: {
  readonly title: string;
  readonly open: boolean;
  readonly onClose: () => void;
  readonly children: ReactNode;
  /** Beside the way out, the last one first. */
  readonly actions?: ReactNode;
  /** Escape and a button lead out of it. */
  readonly closable?: boolean;
  readonly closeLabel?: string;
}) {
  const ref = useRef<HTMLDialogElement>(null);
  const id = useId();
  useLayoutEffect(() => {
    const dialog = ref.current;
    if (dialog === null || !open) return;
    dialog.showModal();
    // Before the element leaves the page, so that the browser gives the focus back to where it came from.
    return () => dialog.close();
  }, [open]);
  return (
    <dialog
      ref={ref}
      className="cp-dialog"
      aria-labelledby={id}
      onCancel={(event) => {
        event.preventDefault(); // the screen decides: it owns `open`
        if (closable) onClose();
      }}
    >
      {open ? (
        <Stack gap="l">
          <Heading level={2} id={id}>
            {title}
          </Heading>
          {children}
          {closable || actions !== undefined ? (
            <div style={{ marginTop: space.s }}>
              <Row justify="flex-end">
                {closable ? <Button label={closeLabel} onPress={onClose} /> : null}
                {actions}
              </Row>
            </div>
          ) : null}
        </Stack>
      ) : null}
    </dialog>
  );
}
