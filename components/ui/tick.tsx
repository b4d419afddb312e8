import type { ReactNode, Ref } from 'react';
import { View } from 'react-native';
import { FieldError, fieldIds } from './field.tsx';
import { useId } from 'react';
import { TickBox } from './tick-box.web.tsx';

export type TickProps = {
  readonly label: string;
  readonly checked: boolean;
  readonly onChange: (checked: boolean) => void;
  readonly onBlur?: () => void;
  readonly hint?: ReactNode;
  readonly error?: string;
  readonly disabled?: boolean;
  readonly large?: boolean;
  readonly ref?: Ref<HTMLInputElement>;
};

/** A box to tick; the whole line is its target. `large` on operators' pages. */
export function Tick(props: TickProps) {
  const ids = fieldIds(useId());
  return (
    <View>
      <TickBox {...props} describedBy={props.error === undefined ? undefined : ids.error} />
      <FieldError id={ids.error} error={props.error} />
    </View>
  );
}
