import type { Ref } from 'react';
import { Mark, type MarkName } from './mark.tsx';

export type ButtonProps = {
  /** Says what happens; read aloud as well. */
  readonly label: string;
  /** 'main' is the one action that matters on a page; 'quiet' has no frame. */
  readonly kind?: 'main' | 'plain' | 'quiet';
  /** Operators' actions are large (64 px), the three that matter on a plate gloved (96 px). */
  readonly size?: 'usual' | 'large' | 'gloved';
  readonly onPress?: () => void;
  /** Sends the form it stands in. */
  readonly submit?: boolean;
  readonly disabled?: boolean;
  /** It is being done: presses are not taken, and it says so. */
  readonly busy?: boolean;
  readonly fill?: boolean;
  /** Only where the label alone does not tell which of several things it acts on. */
  readonly spoken?: string;
  readonly mark?: MarkName;
  readonly expanded?: boolean;
  readonly ref?: Ref<HTMLButtonElement>;
};

export function Button({
  label,
  kind = 'plain',
  size = 'usual',
  onPress,
  submit = false,
  disabled = false,
  busy = false,
  fill = false,
  spoken,
  mark,
  expanded,
  ref,
}: ButtonProps) {
  return (
    <button
      ref={ref}
      type={submit ? 'submit' : 'button'}
      className={`cp-button cp-${kind} cp-${size}`}
      disabled={disabled}
      aria-disabled={busy || undefined}
      aria-busy={busy || undefined}
      aria-label={spoken}
      aria-expanded={expanded}
      onClick={(event) => {
        if (!busy) return onPress?.();
        event.preventDefault(); // also keeps a busy submit button from sending twice
      }}
      style={fill ? { width: '100%' } : undefined}
    >
      {mark === undefined ? null : (
        <span style={{ marginRight: 8, verticalAlign: 'middle', display: 'inline-flex' }}>
          <Mark name={mark} size={20} />
        </span>
      )}
      {busy ? `${label} …` : label}
    </button>
  );
}
