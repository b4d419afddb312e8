import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { strategiesQuery } from '@/components/data/strategies.ts';
import { useActor } from '@/components/shell/actor.tsx';
import { Page } from '@/components/shell/page.tsx';
import { strategiesText, thicknessRangeText } from '@/components/text/pierce.ts';
import { useLayout } from '@/components/theme/layout.ts';
import { roles } from '@/components/theme/roles.ts';
import { Empty } from '@/components/ui/empty.tsx';
import { ErrorNotice } from '@/components/ui/error-notice.tsx';
import { ButtonLink } from '@/components/ui/link.tsx';
import { LinkRow, Rows } from '@/components/ui/link-row.tsx';
import { Mark } from '@/components/ui/mark.tsx';
import { Progress } from '@/components/ui/progress.tsx';
import { Cell, Row, Stack } from '@/components/ui/stack.tsx';
import { Heading, Small } from '@/components/ui/text.tsx';
import { TextField } from '@/components/ui/text-field.tsx';
import { useUnitSystem } from '@/components/ui/unit-system.ts';
import { may } from '@/shared/policy.ts';
import type { StrategySummary } from '@/shared/strategies.ts';
import type { UnitSystem } from '@/strategy/units/index.ts';
import { Core } from './core.tsx';
import { StateMark } from './state-mark.tsx';

/** All strategies of the plant, each with its core, where it stands and its reserves. */
export function StrategiesScreen() {
  const actor = useActor();
  const system = useUnitSystem();
  const strategies = useQuery(strategiesQuery());
  const [sought, setSought] = useState('');
  const mayWrite = actor !== null && may(actor, 'strategy.write');
  const begin = mayWrite && <ButtonLink kind="main" href="/strategies/new" label={strategiesText.new} />;
  const found = (strategies.data ?? []).filter((one) => strategyMatches(one, sought, system));

  return (
    <Page title={strategiesText.title} actions={begin || undefined}>
      {strategies.data ? (
        strategies.data.length === 0 ? (
          <Empty title={strategiesText.empty} action={begin}>
            {strategiesText.emptyHint}
          </Empty>
        ) : (
          <Stack gap="l">
            <TextField kind="search" label={strategiesText.search} value={sought} onChange={setSought} />
            {found.length === 0 ? (
              <Empty title={strategiesText.noneFound(sought)} />
            ) : (
              <Rows label={strategiesText.list}>
                {found.map((one) => (
                  <StrategyRow key={one.id} strategy={one} system={system} />
                ))}
              </Rows>
            )}
          </Stack>
        )
      ) : strategies.isError ? (
        <ErrorNotice error={strategies.error} onRetry={() => void strategies.refetch()} />
      ) : (
        <Progress label={strategiesText.loading} />
      )}
    </Page>
  );
}

function StrategyRow({ strategy, system }: { strategy: StrategySummary; system: UnitSystem }) {
  const { wide } = useLayout();
  const { latest, approved } = strategy;
  const what = (
    <Stack gap="hair">
      <Heading level={3}>{`${strategy.gradeGroup}, ${thicknessRangeText(strategy.thickness, system)}`}</Heading>
      <Small strong>{strategy.machine.name}</Small>
      <Small>{strategy.name}</Small>
    </Stack>
  );
  const stand = (
    <Stack gap="hair">
      <StateMark small state={latest.state} detail={strategiesText.revision(latest.number)} />
      {approved && approved.id !== latest.id && <Small>{strategiesText.alsoApproved(approved.number)}</Small>}
      <Small>{strategiesText.reserves(latest.reserveCold, latest.reserveHot)}</Small>
      {strategy.openReports > 0 && (
        <Row gap="s" wrap={false}>
          <span style={{ color: roles.hot, display: 'inline-flex' }}>
            <Mark name="caution" size={18} />
          </span>
          <Small tone="hot">{strategiesText.reports(strategy.openReports)}</Small>
        </Row>
      )}
    </Stack>
  );
  return (
    <LinkRow
      href={`/strategies/${strategy.id}`}
      left={<Core bands={latest.bands} reserve={latest.reserveCold} size={48} silent />}
    >
      {wide ? (
        <Row align="flex-start" wrap={false} gap="xl">
          <Cell grow={3}>{what}</Cell>
          <Cell grow={2}>{stand}</Cell>
        </Row>
      ) : (
        <Stack gap="xs">
          {what}
          {stand}
        </Stack>
      )}
    </LinkRow>
  );
}

/** Every word typed is found in what the row shows; a plain number also finds the range that holds it, in the unit shown. */
export function strategyMatches(strategy: StrategySummary, sought: string, system: UnitSystem): boolean {
  const range = thicknessRangeText(strategy.thickness, system);
  const text = [strategy.name, strategy.gradeGroup, strategy.machine.name, range].join(' ').toLowerCase();
  const unit = system === 'metric' ? 1000 : 25_400;
  return sought
    .toLowerCase()
    .split(/\s+/)
    .filter((word) => word !== '' && word !== 'mm' && word !== 'in')
    .every((word) => {
      const thickness = Number(word.replace(',', '.').replace(/mm$|in$/, '')) * unit;
      return text.includes(word) || (thickness >= strategy.thickness.min && thickness < strategy.thickness.max);
    });
}
