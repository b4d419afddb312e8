import { Pressable, View } from 'react-native';
import { Mark, type MarkName } from './mark.tsx';
import { SubmitButton } from './submit-button.web.tsx';
import { Words } from './words.tsx';

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
}: ButtonProps) {
  const look = `button ${kind} ${size}`;
  const content = (
    <>
      {mark === undefined ? null : (
        <View style={{ marginRight: 8 }}>
          <Mark name={mark} size={20} />
        </View>
      )}
      <Words>{busy ? `${label} …` : label}</Words>
    </>
  );
  if (submit) {
    return (
      <SubmitButton look={look} onPress={onPress} disabled={disabled} busy={busy} fill={fill} spoken={spoken}>
        {content}
      </SubmitButton>
    );
  }
  return (
    <Pressable
      role="button"
      dataSet={{ look }}
      disabled={disabled}
      aria-busy={busy || undefined}
      aria-label={spoken}
      aria-expanded={expanded}
      onPress={busy ? undefined : onPress}
      style={fill ? { width: '100%' } : undefined}
    >
      {content}
    </Pressable>
  );
}
