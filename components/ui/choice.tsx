import type { ReactNode, Ref } from 'react';
import { ListChoice } from './list-choice.web.tsx';
import { RadioChoice } from './radio-choice.web.tsx';

export type ChoiceOption<V extends string> = { readonly value: V; readonly label: string; readonly hint?: string };

export type ChoiceProps<V extends string> = {
  readonly label: string;
  readonly options: readonly ChoiceOption<V>[];
  readonly value: V | null;
  readonly onChange: (value: V) => void;
  readonly onBlur?: () => void;
  /** 'segments' for two to four short words, 'radios' for options that need a sentence, 'list' for many. */
  readonly kind?: 'segments' | 'radios' | 'list';
  readonly hint?: ReactNode;
  readonly error?: string;
  readonly disabled?: boolean;
  /** Shown in a list while nothing is chosen. */
  readonly placeholder?: string;
  readonly name?: string;
  /** For a gloved hand: taller, with larger letters. */
  readonly large?: boolean;
  readonly ref?: Ref<HTMLSelectElement & HTMLInputElement>;
};

/** One of several. */
export function Choice<V extends string>(props: ChoiceProps<V>) {
  return props.kind === 'list' ? <ListChoice {...props} /> : <RadioChoice {...props} />;
}
