import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { strategiesQuery, strategyQuery } from '@/components/data/strategies.ts';
import { useActor } from '@/components/shell/actor.tsx';
import { Page } from '@/components/shell/page.tsx';
import { common } from '@/components/text/common.ts';
import { strategiesText, thicknessRangeText } from '@/components/text/pierce.ts';
import { useLayout } from '@/components/theme/layout.ts';
import { Empty } from '@/components/ui/empty.tsx';
import { ErrorNotice } from '@/components/ui/error-notice.tsx';
import { ButtonLink } from '@/components/ui/link.tsx';
import { LinkRow, Rows } from '@/components/ui/link-row.tsx';
import { Mark } from '@/components/ui/mark.tsx';
import { PressRow } from '@/components/ui/press-row.tsx';
import { Progress } from '@/components/ui/progress.tsx';
import { Cell, Row, Stack } from '@/components/ui/stack.tsx';
import { Figure, Heading, Small } from '@/components/ui/text.tsx';
import { TextField } from '@/components/ui/text-field.tsx';
import { useUnitSystem } from '@/components/ui/unit-system.ts';
import { may } from '@/shared/policy.ts';
import type { StrategySummary } from '@/shared/strategies.ts';
import type { UnitSystem } from '@/strategy/units/index.ts';
import { Core } from './core.tsx';
import { StateMark } from './state-mark.tsx';
import { RevisionRows, StandingSection } from './strategy-parts.tsx';

/** All strategies of the plant, each with its core, where it stands and its reserves; on a wide screen the chosen one's section beside. */
export function StrategiesScreen() {
  const actor = useActor();
  const { wide } = useLayout();
  const system = useUnitSystem();
  const strategies = useQuery(strategiesQuery());
  const [sought, setSought] = useState('');
  const [chosen, setChosen] = useState<string | null>(null);
  const mayWrite = actor !== null && may(actor, 'strategy.write');
  const begin = mayWrite && <ButtonLink kind="main" href="/strategies/new" label={strategiesText.new} />;
  const found = (strategies.data ?? []).filter((one) => strategyMatches(one, sought, system));
  const shown = found.find(({ id }) => id === chosen) ?? found[0];

  const list = (
    <Stack gap="l">
      <TextField kind="search" label={strategiesText.search} value={sought} onChange={setSought} />
      {found.length === 0 ? (
        <Empty title={strategiesText.noneFound(sought)} />
      ) : (
        <Rows label={strategiesText.list}>
          {found.map((one) => {
            const core = <Core bands={one.latest.bands} reserve={one.latest.reserveCold} size={48} silent />;
            return wide ? (
              <PressRow key={one.id} chosen={one.id === shown?.id} left={core} onPress={() => setChosen(one.id)}>
                <StrategyFacts strategy={one} system={system} />
              </PressRow>
            ) : (
              <LinkRow key={one.id} href={`/strategies/${one.id}`} left={core}>
                <StrategyFacts strategy={one} system={system} />
              </LinkRow>
            );
          })}
        </Rows>
      )}
    </Stack>
  );

  return (
    <Page title={strategiesText.title} actions={begin || undefined} estimates>
      {strategies.data ? (
        strategies.data.length === 0 ? (
          <Empty title={strategiesText.empty} action={begin}>
            {strategiesText.emptyHint}
          </Empty>
        ) : wide ? (
          <Row align="flex-start" wrap={false} gap="xl">
            <Cell grow={2}>{list}</Cell>
            <Cell grow={3}>{shown && <StrategyPane key={shown.id} id={shown.id} />}</Cell>
          </Row>
        ) : (
          list
        )
      ) : strategies.isError ? (
        <ErrorNotice error={strategies.error} onRetry={() => void strategies.refetch()} />
      ) : (
        <Progress label={strategiesText.loading} />
      )}
    </Page>
  );
}

/** The chosen strategy beside the list: its section and its revisions. */
function StrategyPane({ id }: { id: string }) {
  const strategy = useQuery(strategyQuery(id));
  if (!strategy.data) {
    return strategy.isError ? (
      <ErrorNotice error={strategy.error} onRetry={() => void strategy.refetch()} />
    ) : (
      <Progress label={common.loading} />
    );
  }
  return (
    <Stack gap="l">
      <Row justify="space-between">
        <Stack grow>
          <Heading level={2}>{strategy.data.name}</Heading>
        </Stack>
        <ButtonLink href={`/strategies/${id}`} label={strategiesText.open} />
      </Row>
      <StandingSection strategy={strategy.data} />
      <RevisionRows strategy={strategy.data} />
    </Stack>
  );
}

function StrategyFacts({ strategy, system }: { strategy: StrategySummary; system: UnitSystem }) {
  const { latest, approved } = strategy;
  return (
    <Stack gap="hair">
      <Figure value={`${strategy.gradeGroup}, ${thicknessRangeText(strategy.thickness, system)}`} />
      <Small strong>{strategy.machine.name}</Small>
      <Small>{strategy.name}</Small>
      <StateMark small state={latest.state} detail={strategiesText.revision(latest.number)} />
      {approved && approved.id !== latest.id && <Small>{strategiesText.alsoApproved(approved.number)}</Small>}
      <Small>{strategiesText.reserves(latest.reserveCold, latest.reserveHot)}</Small>
      {strategy.openReports > 0 && (
        <Row gap="s" wrap={false}>
          <Mark name="caution" size={18} tone="hot" />
          <Small tone="hot">{strategiesText.reports(strategy.openReports)}</Small>
        </Row>
      )}
    </Stack>
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
