import type { ReactNode, Ref } from 'react';

/** A form's own button: only the page's `type="submit"` is pressed by Enter in a field, and React Native has none. */
export function SubmitButton({
  look,
  children,
  onPress,
  disabled,
  busy,
  fill,
  spoken,
  ref,
}: {
  readonly look: string;
  readonly children: ReactNode;
  readonly onPress?: () => void;
  readonly disabled: boolean;
  readonly busy: boolean;
  readonly fill: boolean;
  readonly spoken?: string;
  readonly ref?: Ref<HTMLButtonElement>;
}) {
  return (
    <button
      ref={ref}
      type="submit"
      data-look={look}
      disabled={disabled}
      aria-disabled={busy || undefined}
      aria-busy={busy || undefined}
      aria-label={spoken}
      onClick={(event) => {
        if (!busy) return onPress?.();
        event.preventDefault(); // so that a busy form isn't sent twice
      }}
      style={fill ? { width: '100%' } : undefined}
    >
      {children}
    </button>
  );
}
