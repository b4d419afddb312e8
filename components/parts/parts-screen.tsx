import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { partQuery, partsQuery } from '@/components/data/parts.ts';
import { useActor } from '@/components/shell/actor.tsx';
import { Page } from '@/components/shell/page.tsx';
import { common } from '@/components/text/common.ts';
import { momentText } from '@/components/text/moments.ts';
import { partsText, sizeText } from '@/components/text/parts.ts';
import { useLayout } from '@/components/theme/layout.ts';
import { Empty } from '@/components/ui/empty.tsx';
import { ErrorNotice } from '@/components/ui/error-notice.tsx';
import { ButtonLink } from '@/components/ui/link.tsx';
import { LinkRow, Rows } from '@/components/ui/link-row.tsx';
import { PressRow } from '@/components/ui/press-row.tsx';
import { Progress } from '@/components/ui/progress.tsx';
import { Cell, Row, Stack } from '@/components/ui/stack.tsx';
import { Figure, Heading, Small } from '@/components/ui/text.tsx';
import { TextField } from '@/components/ui/text-field.tsx';
import { useUnitSystem } from '@/components/ui/unit-system.ts';
import type { PartSummary } from '@/shared/parts.ts';
import { may } from '@/shared/policy.ts';
import { PartDrawing } from './part-drawing.tsx';

/** All parts of the plant; on a wide screen the chosen one's drawing beside. */
export function PartsScreen() {
  const actor = useActor();
  const { wide } = useLayout();
  const parts = useQuery(partsQuery());
  const [sought, setSought] = useState('');
  const [chosen, setChosen] = useState<string | null>(null);
  const add = actor && may(actor, 'part.write') && <ButtonLink kind="main" href="/parts/new" label={partsText.new} />;
  const words = sought.toLowerCase().split(/\s+/);
  const found = (parts.data ?? []).filter(({ name, fileName }) =>
    words.every((word) => `${name} ${fileName}`.toLowerCase().includes(word)),
  );
  const shown = found.find(({ id }) => id === chosen) ?? found[0];
  const list = (
    <Stack gap="l">
      <TextField kind="search" label={partsText.search} value={sought} onChange={setSought} />
      {found.length === 0 ? (
        <Empty title={partsText.noneFound(sought)} />
      ) : (
        <Rows label={partsText.list}>
          {found.map((part) =>
            wide ? (
              <PressRow key={part.id} chosen={part.id === shown?.id} onPress={() => setChosen(part.id)}>
                <PartFacts part={part} />
              </PressRow>
            ) : (
              <LinkRow key={part.id} href={`/parts/${part.id}`}>
                <PartFacts part={part} />
              </LinkRow>
            ),
          )}
        </Rows>
      )}
    </Stack>
  );
  return (
    <Page title={partsText.title} actions={add || undefined}>
      {parts.data ? (
        parts.data.length === 0 ? (
          <Empty title={partsText.empty} action={add}>
            {partsText.emptyHint}
          </Empty>
        ) : wide ? (
          <Row align="flex-start" wrap={false} gap="xl">
            <Cell grow={2}>{list}</Cell>
            <Cell grow={3}>{shown && <PartPane key={shown.id} id={shown.id} />}</Cell>
          </Row>
        ) : (
          list
        )
      ) : parts.isError ? (
        <ErrorNotice error={parts.error} onRetry={() => void parts.refetch()} />
      ) : (
        <Progress label={partsText.loading} />
      )}
    </Page>
  );
}

/** The chosen part beside the list. */
function PartPane({ id }: { id: string }) {
  const part = useQuery(partQuery(id));
  if (!part.data) {
    return part.isError ? (
      <ErrorNotice error={part.error} onRetry={() => void part.refetch()} />
    ) : (
      <Progress label={common.loading} />
    );
  }
  return (
    <Stack gap="l">
      <Row justify="space-between">
        <Stack grow>
          <Heading level={2}>{part.data.name}</Heading>
        </Stack>
        <ButtonLink href={`/parts/${id}`} label={partsText.open} />
      </Row>
      <PartDrawing part={part.data} />
    </Stack>
  );
}

function PartFacts({ part }: { part: PartSummary }) {
  const system = useUnitSystem();
  return (
    <Stack gap="hair">
      <Figure value={part.name} />
      <Small strong>{`${sizeText(part.width, part.height, system)}, ${partsText.holds(part)}`}</Small>
      <Small>{partsText.plans(part.cornerPlans)}</Small>
      <Small>{`${part.fileName}, ${part.addedBy.name}, ${momentText(part.addedAt)}`}</Small>
    </Stack>
  );
}
