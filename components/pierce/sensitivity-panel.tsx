import { useMemo } from 'react';
import { sensitivityText } from '@/components/text/pierce-designer.ts';
import { reserveText } from '@/components/text/pierce.ts';
import { roles } from '@/components/theme/roles.ts';
import { family } from '@/components/theme/type.ts';
import { Panel } from '@/components/ui/panel.tsx';
import { Small } from '@/components/ui/text.tsx';
import type { StrategyContent } from '@/shared/strategies.ts';
import type { MachineProfile, Nozzle } from '@/strategy/machine.ts';
import { pierceSensitivity, type ReserveRules, type SensitivityRow } from '@/strategy/pierce/index.ts';

type SensitivityPanelProps = { content: StrategyContent; profile: MachineProfile; nozzle: Nozzle; rules: ReserveRules };

/** What a dirty or clean plate, a worn nozzle, a thicker and a hot plate do to the reserve, as bars on one scale. */
export function SensitivityPanel({ content, profile, nozzle, rules }: SensitivityPanelProps) {
  const rows = useMemo(() => sensitivityOf(content, profile, nozzle), [content, profile, nozzle]);
  if (rows.length === 0) return null;
  const { cold } = rules;
  const most = Math.max(cold, ...rows.map(({ reserve }) => (reserve.kind === 'ok' ? reserve.value : 0))) * 1.05;
  const share = (value: number) => `${Math.round((value / most) * 1000) / 10}%`;
  return (
    <Panel title={sensitivityText.title}>
      <Small>{`${sensitivityText.hint} ${sensitivityText.asked(reserveText(cold))}`}</Small>
      <ul aria-label={sensitivityText.title} style={styles.list}>
        {rows.map(({ id, what, reserve, change }) => {
          const value = reserve.kind === 'ok' ? reserve.value : null;
          const changed = id === 'as-set' || change === null ? '' : changeText(change);
          const figure = value === null ? sensitivityText.notThrough : reserveText(value);
          const short = value === null || value < cold;
          return (
            <li key={id} style={styles.row}>
              <span className="cp-hidden">{sensitivityText.row(what, figure, changed)}</span>
              <span aria-hidden="true" style={styles.words}>
                <span>{what}</span>
                <span style={styles.figure}>
                  {figure}
                  {changed !== '' && <span style={styles.change}>{changed}</span>}
                </span>
              </span>
              <span aria-hidden="true" style={styles.track}>
                <span
                  style={{
                    ...styles.bar,
                    width: value === null ? 0 : share(value),
                    // what falls short of the rule is open, with an edge: told by shape, not by colour alone
                    background: short ? 'transparent' : roles.cold,
                    borderColor: short ? roles.hot : roles.cold,
                  }}
                />
                <span style={{ ...styles.rule, left: share(cold) }} />
              </span>
            </li>
          );
        })}
      </ul>
    </Panel>
  );
}

/** Empty where the model can't follow. */
function sensitivityOf(content: StrategyContent, profile: MachineProfile, nozzle: Nozzle): readonly SensitivityRow[] {
  try {
    return pierceSensitivity({
      stages: content.stages,
      thickness: { min: content.thickness.min * 1e-6, max: content.thickness.max * 1e-6 },
      hottestPlateTemperature: content.hottestPlate,
      profile,
      nozzle,
    });
  } catch (error) {
    if (error instanceof RangeError) return [];
    throw error;
  }
}

const changeText = (change: number): string =>
  Math.abs(change) < 0.005 ? sensitivityText.same : sensitivityText.change(change);

const styles = {
  list: { listStyle: 'none', margin: 0, padding: 0, display: 'flex', flexDirection: 'column', gap: 14 },
  row: { display: 'flex', flexDirection: 'column', gap: 4, position: 'relative' },
  words: {
    display: 'flex',
    justifyContent: 'space-between',
    alignItems: 'baseline',
    gap: 16,
    fontFamily: family.reading,
    fontSize: 16,
    lineHeight: '22px',
    color: roles.ink,
  },
  figure: {
    fontFamily: family.figure,
    fontSize: 19,
    fontVariantNumeric: 'tabular-nums',
    whiteSpace: 'nowrap',
    flex: 'none',
  },
  change: { color: roles.softInk, fontSize: 17, marginLeft: 10 },
  track: { position: 'relative', display: 'block', height: 12, borderBottom: `1px solid ${roles.rule}` },
  bar: { position: 'absolute', left: 0, top: 0, height: 10, borderWidth: 1.5, borderStyle: 'solid' },
  rule: { position: 'absolute', top: -3, height: 18, width: 1, background: roles.ink },
} as const;
