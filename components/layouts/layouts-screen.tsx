import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { layoutsQuery } from '@/components/data/layouts.ts';
import { useActor } from '@/components/shell/actor.tsx';
import { Page } from '@/components/shell/page.tsx';
import { layoutsText } from '@/components/text/layouts.ts';
import { momentText } from '@/components/text/moments.ts';
import { Empty } from '@/components/ui/empty.tsx';
import { ErrorNotice } from '@/components/ui/error-notice.tsx';
import { ButtonLink } from '@/components/ui/link.tsx';
import { LinkRow, Rows } from '@/components/ui/link-row.tsx';
import { Mark } from '@/components/ui/mark.tsx';
import { Progress } from '@/components/ui/progress.tsx';
import { Stack } from '@/components/ui/stack.tsx';
import { Figure, Small } from '@/components/ui/text.tsx';
import { TextField } from '@/components/ui/text-field.tsx';
import { useUnitSystem } from '@/components/ui/unit-system.ts';
import type { LayoutSummary } from '@/shared/layouts.ts';
import { may } from '@/shared/policy.ts';

/** All plate layouts of the plant, the last changed first. */
export function LayoutsScreen() {
  const actor = useActor();
  const layouts = useQuery(layoutsQuery());
  const [sought, setSought] = useState('');
  const add = actor && may(actor, 'layout.write') && (
    <ButtonLink kind="main" href="/layouts/new" label={layoutsText.new} />
  );
  const words = sought.toLowerCase().split(/\s+/);
  const found = (layouts.data ?? []).filter(({ name, of }) =>
    words.every((word) => `${name} ${of ?? ''}`.toLowerCase().includes(word)),
  );
  return (
    <Page title={layoutsText.title} actions={add || undefined} measure="reading">
      {layouts.data ? (
        layouts.data.length === 0 ? (
          <Empty title={layoutsText.empty} action={add}>
            {layoutsText.emptyHint}
          </Empty>
        ) : (
          <Stack gap="l">
            <TextField kind="search" label={layoutsText.search} value={sought} onChange={setSought} />
            {found.length === 0 ? (
              <Empty title={layoutsText.noneFound(sought)} />
            ) : (
              <Rows label={layoutsText.list}>
                {found.map((layout) => (
                  <LinkRow
                    key={layout.id}
                    href={`/layouts/${layout.id}`}
                    right={layout.problems > 0 ? <Mark name="caution" tone="hot" /> : undefined}
                  >
                    <LayoutFacts layout={layout} />
                  </LinkRow>
                ))}
              </Rows>
            )}
          </Stack>
        )
      ) : layouts.isError ? (
        <ErrorNotice error={layouts.error} onRetry={() => void layouts.refetch()} />
      ) : (
        <Progress label={layoutsText.loading} />
      )}
    </Page>
  );
}

function LayoutFacts({ layout }: { layout: LayoutSummary }) {
  const system = useUnitSystem();
  return (
    <Stack gap="hair">
      <Figure value={layout.name} />
      <Small strong>{layoutsText.on(layout, system)}</Small>
      <Small>
        {layout.pieces === 0
          ? layoutsText.holds(0)
          : `${layoutsText.holds(layout.pieces)}, ${layoutsText.problems(layout.problems)}`}
      </Small>
      <Small>{`${layout.changedBy.name}, ${momentText(layout.changedAt)}`}</Small>
    </Stack>
  );
}
