import type { CSSProperties } from 'react';
import { common } from '@/components/text/common.ts';
import {
  explainText,
  explanationOf,
  parameterRow,
  resultLabel,
  resultValue,
  type Explained,
  type ExplainedFrom,
  type ResultName,
} from '@/components/text/pierce-explain.ts';
import { useLayout } from '@/components/theme/layout.ts';
import { roles } from '@/components/theme/roles.ts';
import { touch } from '@/components/theme/space.ts';
import { family } from '@/components/theme/type.ts';
import { Dialog } from '@/components/ui/dialog.tsx';
import { Facts } from '@/components/ui/facts.tsx';
import { Stack } from '@/components/ui/stack.tsx';
import { Body, Figure, Heading, Small } from '@/components/ui/text.tsx';

/** A result as a figure that tells, when pressed, how it comes about. */
export function ResultButton({ label, value, onPress }: { label: string; value: string; onPress: () => void }) {
  return (
    <button type="button" aria-label={explainText.spoken(label, value)} onClick={onPress} style={styles.figure}>
      <span style={styles.dotted}>{value}</span>
    </button>
  );
}

/** Results side by side, as cells of the title block; each is one press. */
export function ResultGrid({
  names,
  from,
  onExplain,
}: {
  names: readonly Exclude<ResultName, 'depth'>[];
  from: ExplainedFrom;
  onExplain: (explained: Explained) => void;
}) {
  const { width } = useLayout();
  return (
    <div
      role="group"
      aria-label={explainText.results}
      style={{ ...styles.grid, gridTemplateColumns: `repeat(${width < 372 ? 2 : 4}, 1fr)` }}
    >
      {names.map((name) => {
        const value = resultValue(name, from.prediction, from.system);
        return (
          <button
            key={name}
            type="button"
            aria-label={explainText.spoken(resultLabel[name], value)}
            onClick={() => onExplain({ name })}
            style={styles.cell}
          >
            <span style={styles.label}>{resultLabel[name]}</span>
            <span style={{ ...styles.value, ...styles.dotted }}>{value}</span>
          </button>
        );
      })}
    </div>
  );
}

type ExplainDialogProps = { explained: Explained | null; from: ExplainedFrom; onClose: () => void };

/** What a result is, its formula in words, the numbers it was worked out from, what had to be assumed, and the sources. */
export function ExplainDialog({ explained, from, onClose }: ExplainDialogProps) {
  const told = explained && explanationOf(explained, from);
  return (
    <Dialog title={told?.title ?? ''} open={told !== null} onClose={onClose} closeLabel={common.close}>
      {told && (
        <Stack gap="l">
          <Figure large value={told.value} />
          <Body>{told.what}</Body>
          <Stack gap="xs">
            <Heading level={3}>{explainText.formula}</Heading>
            <Body>{told.formula}</Body>
          </Stack>
          <Stack gap="xs">
            <Heading level={3}>{explainText.inputs}</Heading>
            <Facts items={told.inputs.map(({ label, value }) => ({ label, value: together(value) }))} />
          </Stack>
          {told.parameters.length > 0 && (
            <Stack gap="xs">
              <Heading level={3}>{explainText.parameters}</Heading>
              <Facts
                items={told.parameters.flatMap((name) => {
                  const row = parameterRow(name, from.system);
                  if (!row) return [];
                  const label = `${row.meaning}. ${explainText.origin(row.origin)}`;
                  return [{ label: `${label.charAt(0).toUpperCase()}${label.slice(1)}`, value: together(row.value) }];
                })}
              />
            </Stack>
          )}
          <Stack gap="xs">
            <Heading level={3}>{explainText.source}</Heading>
            <Body>{told.source}</Body>
            <Small>{explainText.model(from.prediction.modelVersion)}</Small>
          </Stack>
        </Stack>
      )}
    </Dialog>
  );
}

/** A number and its unit on one line. */
const together = (value: string): string => value.replaceAll(' ', '\u00a0');

const button: CSSProperties = {
  background: 'transparent',
  border: 0,
  margin: 0,
  padding: 0,
  color: roles.ink,
  cursor: 'pointer',
  textAlign: 'left',
};
const styles = {
  figure: {
    ...button,
    fontFamily: family.figure,
    fontSize: 20,
    lineHeight: '25px',
    fontVariantNumeric: 'tabular-nums',
    minWidth: touch.least,
    minHeight: touch.least,
    marginBlock: -11,
  },
  dotted: {
    textDecoration: 'underline',
    textDecorationStyle: 'dotted',
    textDecorationColor: roles.softInk,
    textUnderlineOffset: 4,
  },
  grid: {
    display: 'grid',
    gap: 1,
    background: roles.rule,
    border: `1px solid ${roles.ink}`,
    borderRadius: 3,
    overflow: 'hidden',
  },
  cell: {
    ...button,
    display: 'flex',
    flexDirection: 'column',
    background: roles.sheet,
    padding: '9px 10px',
    minHeight: 62,
    minWidth: 0,
    outlineOffset: -3,
  },
  label: { fontFamily: family.label, fontSize: 14, lineHeight: '18px', color: roles.softInk },
  value: { fontFamily: family.figure, fontSize: 20, lineHeight: '25px', fontVariantNumeric: 'tabular-nums' },
} as const satisfies Record<string, CSSProperties>;
