import { useId, useState, type ReactNode, type Ref } from 'react';
import { StyleSheet, Text, TextInput, View, type TextStyle } from 'react-native';
import { roles } from '@/components/theme/roles.ts';
import { family } from '@/components/theme/type.ts';
import { quantityParse, quantityText, type Dimension } from '@/strategy/units/index.ts';
import { describedBy, Field, largeControl } from './field.tsx';
import { usualUnit, useUnitSystem } from './unit-system.ts';

export type NumberFieldProps = {
  readonly label: string;
  readonly dimension: Dimension;
  /** SI. Null for an empty field. */
  readonly value: number | null;
  /** SI; null when emptied, NaN while what is typed means nothing (so that no schema takes it). */
  readonly onChange: (value: number | null) => void;
  readonly onBlur?: () => void;
  /** The unit of a number typed without one; else the usual one of the person's system. */
  readonly unit?: string;
  /** What stands beside the number in place of the unit: of a plain number, what it is a number of. */
  readonly unitShown?: string;
  readonly hint?: ReactNode;
  readonly error?: string;
  readonly optional?: boolean;
  readonly disabled?: boolean;
  readonly name?: string;
  /** For a gloved hand: taller, with larger letters. */
  readonly large?: boolean;
  readonly ref?: Ref<TextInput>;
};

/**
 * A field for a quantity: takes "3/4 in", "12 psi", "2 min 15 s" or a plain number, says how it was understood, and hands
 * over SI. What was typed stays as it was typed.
 */
export function NumberField(props: NumberFieldProps) {
  const {
    label,
    dimension,
    value,
    onChange,
    onBlur,
    hint,
    error,
    optional,
    disabled,
    name,
    large = false,
    unitShown,
    ref,
  } = props;
  const id = useId();
  const system = useUnitSystem();
  const unit = props.unit ?? usualUnit(dimension, system);
  const written = (si: number | null): string =>
    si === null || !Number.isFinite(si) ? '' : quantityText(si, dimension, system, { unit }).number;

  const [typed, setTyped] = useState({ text: written(value), value, unit });
  const [left, setLeft] = useState(false);
  // Did the value or unit change from outside? Then the text follows; else what was typed stands.
  if (!Object.is(typed.value, value) || typed.unit !== unit) setTyped({ text: written(value), value, unit });

  const parsed = typed.text.trim() === '' ? null : quantityParse(typed.text, dimension, unit);
  const misread = left && parsed?.kind === 'none' ? parsed.why : undefined;
  const shownError = misread ?? error;
  const plain = /^[\s+−-]*[\d.,]+$/.test(typed.text.trim());
  const understood = parsed?.kind === 'ok' && !plain ? `understood: ${parsed.understood}` : undefined;
  const shownHint = understood ?? hint;

  return (
    <Field id={id} label={label} hint={shownHint} error={shownError} optional={optional} large={large}>
      <View>
        <TextInput
          id={id}
          ref={ref}
          dataSet={{ look: 'control', field: name }}
          // A full keyboard is needed for fractions and units, so the field is text; phones show digits first.
          inputMode={dimension === 'length' && system === 'inch' ? 'text' : 'decimal'}
          autoComplete="off"
          autoCapitalize="none"
          spellCheck={false}
          disabled={disabled}
          value={typed.text}
          aria-invalid={shownError !== undefined}
          aria-describedby={`${describedBy(id, shownHint, shownError) ?? ''} ${id}-unit`.trim()}
          blurOnSubmit={false}
          onChangeText={(text) => {
            const next = text.trim() === '' ? null : quantityParse(text, dimension, unit);
            const si = next === null ? null : next.kind === 'ok' ? next.value : Number.NaN;
            setTyped({ text, value: si, unit });
            onChange(si);
          }}
          onBlur={() => {
            setLeft(true);
            onBlur?.();
          }}
          style={[figure, large && largeControl]}
        />
        <View style={styles.place}>
          <Text id={`${id}-unit`} style={styles.unit}>
            {unitShown ?? unit}
          </Text>
        </View>
      </View>
    </Field>
  );
}

// a plain object is written on the element itself, above the stylesheet's look of a control
const figure = {
  paddingRight: 76,
  fontFamily: family.figure,
  fontSize: 19,
  fontVariant: ['tabular-nums'],
} satisfies TextStyle;

const styles = StyleSheet.create({
  place: { position: 'absolute', right: 13, top: 0, bottom: 0, justifyContent: 'center', pointerEvents: 'none' },
  unit: { fontFamily: family.label, fontSize: 17, lineHeight: 24, color: roles.softInk },
});
