import { useId, useRef, useState } from 'react';
import { Pressable, StyleSheet, Text, TextInput, View } from 'react-native';
import { useLayout } from '@/components/theme/layout.ts';
import { roles } from '@/components/theme/roles.ts';
import { family } from '@/components/theme/type.ts';
import { webStyle } from '@/components/theme/web-style.ts';
import { quantityParse, quantityText, type Dimension } from '@/strategy/units/index.ts';
import { usualUnit, useUnitSystem } from './unit-system.ts';

export type InlineNumberProps = {
  /** Read aloud; the sentence around the number tells who sees it. */
  readonly label: string;
  readonly dimension: Dimension;
  /** SI, the last number that could be read. */
  readonly value: number;
  readonly onValue: (si: number) => void;
  /** A text that means no number yet: kept by the caller, so it outlives this field. */
  readonly unread?: string;
  readonly onUnread: (text: string) => void;
  readonly unit?: string;
  readonly sign?: boolean;
  readonly error?: string;
  /** Numbers that can't be changed are plain figures. */
  readonly readOnly?: boolean;
  readonly onFocus?: () => void;
};

/** A number edited in place within a sentence: underlined, with its unit; takes "3/4 in" or "12 psi" like any number field. */
export function InlineNumber({
  label,
  dimension,
  value,
  onValue,
  unread,
  onUnread,
  unit: givenUnit,
  sign = false,
  error,
  readOnly = false,
  onFocus,
}: InlineNumberProps) {
  const id = useId();
  const input = useRef<TextInput>(null);
  const system = useUnitSystem();
  // a finger's height on a phone, a line's on a desk
  const minHeight = useLayout().wide ? 38 : 48;
  const unit = givenUnit ?? usualUnit(dimension, system);
  const written = (si: number) => quantityText(si, dimension, system, { unit, sign }).number;
  const [typed, setTyped] = useState({
    text: unread ?? written(value),
    value: unread === undefined ? value : Number.NaN,
    unit,
  });
  // Was the number changed from outside, or is it shown in another unit? Then the text follows.
  if (unread === undefined && (typed.value !== value || typed.unit !== unit)) {
    setTyped({ text: written(value), value, unit });
  }
  if (readOnly) {
    return (
      <View style={[styles.flow, styles.fixed]}>
        <Text style={styles.figure}>{written(value)}</Text>
        <Unit unit={unit} />
      </View>
    );
  }
  const parsed = quantityParse(typed.text, dimension, unit);
  const plain = /^[\s+−-]*[\d.,]+$/.test(typed.text.trim());
  const understood = parsed.kind === 'ok' && !plain ? parsed.understood : undefined;
  const note = error ?? understood;
  return (
    <View style={[styles.flow, styles.whole]}>
      {/* as wide as what is typed, with the unit: a press on any of it leads into the field */}
      <Pressable
        tabIndex={-1}
        onPress={() => input.current?.focus()}
        style={[styles.box, underline(error === undefined), { minHeight }]}
      >
        <TextInput
          ref={input}
          aria-label={`${label}, ${unit}`}
          aria-invalid={error !== undefined}
          aria-describedby={note === undefined ? undefined : id}
          inputMode={dimension === 'length' && system === 'inch' ? 'text' : 'decimal'}
          autoComplete="off"
          autoCapitalize="none"
          spellCheck={false}
          value={typed.text}
          blurOnSubmit={false}
          onFocus={onFocus}
          onChangeText={(text) => {
            const next = quantityParse(text, dimension, unit);
            if (next.kind === 'ok') {
              setTyped({ text, value: next.value, unit });
              onValue(next.value);
            } else {
              // held against no number, so that the text is written anew once the caller has forgotten it
              setTyped({ text, value: Number.NaN, unit });
              onUnread(text);
            }
          }}
          style={[
            styles.figure,
            styles.input,
            { minHeight },
            webStyle({ width: `calc(${Math.min(16, Math.max(1, typed.text.length))}ch + 5px)` }),
          ]}
        />
        <Unit unit={unit} />
      </Pressable>
      <Text
        id={id}
        aria-live="polite"
        style={note === undefined ? undefined : error === undefined ? styles.note : styles.wrong}
      >
        {note}
      </Text>
    </View>
  );
}

/** A degree sign stands close, a factor has none. */
function Unit({ unit }: { readonly unit: string }) {
  if (unit === '×') return null;
  return <Text style={[styles.unit, unit === '°' && styles.close]}>{unit}</Text>;
}

// the underline stands close below the figures, not at the edge of what is touched; written on the element itself, since
// react-native-web's own classes take single values alone
const underline = (right: boolean) =>
  webStyle({
    backgroundImage: right
      ? `repeating-linear-gradient(90deg, ${roles.ember} 0 2px, transparent 2px 5px)`
      : `linear-gradient(${roles.wrong}, ${roles.wrong})`,
    backgroundSize: '100% 2px',
    backgroundPosition: 'left calc(50% + 14px)',
    backgroundRepeat: 'no-repeat',
  });

const styles = StyleSheet.create({
  flow: webStyle({ display: 'inline-flex', verticalAlign: 'baseline' }),
  whole: { flexDirection: 'column', maxWidth: '100%' },
  box: {
    flexDirection: 'row',
    alignSelf: 'flex-start',
    alignItems: 'baseline',
    ...webStyle({ cursor: 'text' }),
  },
  figure: {
    fontFamily: family.figure,
    fontSize: 19,
    lineHeight: 26,
    color: roles.ink,
    fontVariant: ['tabular-nums'],
  },
  input: { paddingHorizontal: 2, textAlign: 'right' },
  unit: {
    fontFamily: family.label,
    fontSize: 17,
    lineHeight: 26,
    color: roles.ink,
    paddingLeft: 3,
    ...webStyle({ whiteSpace: 'nowrap' }),
  },
  close: { paddingLeft: 0 },
  fixed: { flexDirection: 'row', alignItems: 'baseline' },
  note: { fontFamily: family.reading, fontSize: 15, lineHeight: 20, color: roles.softInk, maxWidth: 260 },
  wrong: { fontFamily: family.readingMedium, fontSize: 15, lineHeight: 20, color: roles.wrong, maxWidth: 260 },
});
