import { useLayoutEffect, useRef, type ReactNode } from 'react';

/** The browser's own dialog keeps the focus inside, makes the page behind inert and gives the focus back; React Native's modal doesn't. */
export function ModalElement({
  open,
  labelledBy,
  onCancel,
  children,
}: {
  readonly open: boolean;
  readonly labelledBy: string;
  /** Escape was pressed. */
  readonly onCancel?: () => void;
  readonly children: ReactNode;
}) {
  const ref = useRef<HTMLDialogElement>(null);
  useLayoutEffect(() => {
    const dialog = ref.current;
    if (dialog === null || !open) return;
    dialog.showModal();
    // The browser goes to the first button, which may be the last line of a long sheet: that one is read from its beginning.
    if (dialog.scrollTop > 0) dialog.focus();
    dialog.scrollTop = 0;
    // Before the element leaves the page, so that the browser gives the focus back to where it came from.
    return () => dialog.close();
  }, [open]);
  return (
    <dialog
      ref={ref}
      tabIndex={-1}
      data-look="dialog"
      aria-labelledby={labelledBy}
      onCancel={(event) => {
        event.preventDefault(); // the screen decides: it owns `open`
        onCancel?.();
      }}
    >
      {children}
    </dialog>
  );
}
