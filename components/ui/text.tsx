import type { ReactNode } from 'react';
import { StyleSheet, Text, type TextStyle } from 'react-native';
import { roles } from '@/components/theme/roles.ts';
import type { Role } from '@/components/theme/tokens.ts';
import { family, size } from '@/components/theme/type.ts';
import { webStyle } from '@/components/theme/web-style.ts';

/** Roles that text may have. */
export type TextRole = Extract<Role, 'ink' | 'softInk' | 'ember' | 'onEmber' | 'cold' | 'hot' | 'good' | 'wrong'>;

type TextProps = {
  readonly children: ReactNode;
  readonly tone?: TextRole;
  readonly id?: string;
  readonly align?: 'left' | 'center' | 'right';
  /** Cut after so many lines. */
  readonly lines?: number;
};

const toned = (tone: TextRole | undefined, align: TextProps['align']): TextStyle => ({
  ...(tone === undefined ? {} : { color: roles[tone] }),
  ...(align === undefined ? {} : { textAlign: align }),
});

/** A heading; `level` is its place in the page (1 the page's name), `look` its size where that differs. */
export function Heading({
  children,
  level = 2,
  look = level,
  tone,
  id,
  align,
  lines,
}: TextProps & { readonly level?: 1 | 2 | 3; readonly look?: 1 | 2 | 3 }) {
  return (
    <Text
      role="heading"
      aria-level={level}
      nativeID={id}
      numberOfLines={lines}
      style={[styles.heading, size[`heading${look}`], toned(tone, align)]}
    >
      {children}
    </Text>
  );
}

/** A small label in lower case, as on a drawing. `large` on operators' pages, in ink. */
export function Label({ children, tone, id, align, lines, large = false }: TextProps & { readonly large?: boolean }) {
  return (
    <Text nativeID={id} numberOfLines={lines} style={[styles.label, large && styles.labelLarge, toned(tone, align)]}>
      {children}
    </Text>
  );
}

/** Text for reading. `large` on operators' pages. */
export function Body({
  children,
  tone,
  id,
  align,
  lines,
  strong = false,
  large = false,
}: TextProps & { readonly strong?: boolean; readonly large?: boolean }) {
  return (
    <Text
      nativeID={id}
      numberOfLines={lines}
      style={[styles.body, large && size.bodyLarge, strong && styles.strong, toned(tone, align)]}
    >
      {children}
    </Text>
  );
}

/** What stands in the second place. */
export function Small({ children, tone, id, align, lines, strong = false }: TextProps & { readonly strong?: boolean }) {
  return (
    <Text
      nativeID={id}
      numberOfLines={lines}
      style={[styles.small, strong && styles.strong, strong && styles.ink, toned(tone, align)]}
    >
      {children}
    </Text>
  );
}

/** Text as a machine wrote it, line by line. */
export function Verbatim({ children }: { readonly children: string }) {
  return <Text style={styles.verbatim}>{children}</Text>;
}

/** A number with its unit. Give the number as it is to be read (see strategy/units), not as it is stored. */
export function Figure({
  value,
  unit,
  tone,
  large = false,
  small = false,
  align,
}: {
  readonly value: string | number;
  readonly unit?: string;
  readonly tone?: TextRole;
  /** Beside a drawing, no larger than its labels. */
  readonly small?: boolean;
  readonly large?: boolean;
  readonly align?: TextProps['align'];
}) {
  return (
    <Text style={[styles.figure, large && size.figureLarge, small && size.figureSmall, toned(tone, align)]}>
      {value}
      {unit === undefined || unit === '' ? null : (
        <Text style={[styles.unit, large && styles.unitLarge, tone !== undefined && { color: roles[tone] }]}>
          {unit === '°' ? unit : `\u00a0${unit}`}
        </Text>
      )}
    </Text>
  );
}

const styles = StyleSheet.create({
  heading: { fontFamily: family.figure, color: roles.ink, fontVariant: ['tabular-nums'] },
  label: { fontFamily: family.label, color: roles.softInk, ...size.label },
  labelLarge: { ...size.labelLarge, color: roles.ink },
  body: { fontFamily: family.reading, color: roles.ink, ...size.body, fontVariant: ['tabular-nums'] },
  small: { fontFamily: family.reading, color: roles.softInk, ...size.small, fontVariant: ['tabular-nums'] },
  strong: { fontFamily: family.readingStrong },
  ink: { color: roles.ink },
  verbatim: {
    marginBottom: 8,
    padding: 12,
    borderWidth: 1,
    borderColor: roles.rule,
    borderRadius: 3,
    backgroundColor: roles.sheet,
    fontFamily: 'monospace',
    fontSize: 14,
    lineHeight: 20,
    color: roles.ink,
    ...webStyle({ overflowWrap: 'anywhere' }),
  },
  figure: { fontFamily: family.figure, color: roles.ink, ...size.figure, fontVariant: ['tabular-nums'] },
  unit: { fontSize: 17 },
  unitLarge: { fontSize: 20 },
});
