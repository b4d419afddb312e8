import { useId, useState, type CSSProperties } from 'react';
import { useLayout } from '@/components/theme/layout.ts';
import { roles } from '@/components/theme/roles.ts';
import { family } from '@/components/theme/type.ts';
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
      <span style={styles.fixed}>
        {written(value)}
        <Unit unit={unit} />
      </span>
    );
  }
  const parsed = quantityParse(typed.text, dimension, unit);
  const plain = /^[\s+−-]*[\d.,]+$/.test(typed.text.trim());
  const understood = parsed.kind === 'ok' && !plain ? parsed.understood : undefined;
  const note = error ?? understood;
  return (
    <span style={styles.whole}>
      <label style={{ ...styles.box, ...(error === undefined ? {} : styles.boxWrong), minHeight }}>
        <input
          aria-label={`${label}, ${unit}`}
          aria-invalid={error !== undefined}
          aria-describedby={note === undefined ? undefined : id}
          type="text"
          inputMode={dimension === 'length' && system === 'inch' ? 'text' : 'decimal'}
          autoComplete="off"
          value={typed.text}
          onFocus={onFocus}
          onChange={(event) => {
            const text = event.target.value;
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
          style={{ ...styles.input, minHeight, width: `calc(${Math.min(16, Math.max(1, typed.text.length))}ch + 5px)` }}
        />
        <Unit unit={unit} />
      </label>
      <span
        id={id}
        aria-live="polite"
        style={note === undefined ? undefined : error === undefined ? styles.note : styles.wrong}
      >
        {note}
      </span>
    </span>
  );
}

/** A degree sign stands close, a factor has none. */
function Unit({ unit }: { readonly unit: string }) {
  if (unit === '×') return null;
  return <span style={{ ...styles.unit, ...(unit === '°' ? { paddingLeft: 0 } : {}) }}>{unit}</span>;
}

const figure: CSSProperties = {
  fontFamily: family.figure,
  fontSize: 19,
  lineHeight: '26px',
  color: roles.ink,
  fontVariantNumeric: 'tabular-nums',
};
const styles = {
  whole: { display: 'inline-flex', flexDirection: 'column', maxWidth: '100%', verticalAlign: 'middle' },
  box: {
    display: 'inline-flex',
    alignSelf: 'flex-start',
    alignItems: 'center',
    cursor: 'text',
    // the underline stands close below the figures, not at the edge of what is touched
    backgroundImage: `repeating-linear-gradient(90deg, ${roles.ember} 0 2px, transparent 2px 5px)`,
    backgroundSize: '100% 2px',
    backgroundPosition: 'left calc(50% + 14px)',
    backgroundRepeat: 'no-repeat',
  },
  boxWrong: { backgroundImage: `linear-gradient(${roles.wrong}, ${roles.wrong})` },
  input: {
    ...figure,
    padding: '0 2px',
    border: 0,
    borderRadius: 0,
    background: 'transparent',
    textAlign: 'right',
    appearance: 'none',
    margin: 0,
  },
  unit: {
    fontFamily: family.label,
    fontSize: 17,
    lineHeight: '26px',
    color: roles.ink,
    paddingLeft: 3,
    whiteSpace: 'nowrap',
  },
  fixed: { ...figure, whiteSpace: 'nowrap', display: 'inline-flex', alignItems: 'center' },
  note: { fontFamily: family.reading, fontSize: 15, lineHeight: '20px', color: roles.softInk, maxWidth: 260 },
  wrong: { fontFamily: family.readingMedium, fontSize: 15, lineHeight: '20px', color: roles.wrong, maxWidth: 260 },
} as const satisfies Record<string, CSSProperties>;
