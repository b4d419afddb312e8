import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { partsQuery } from '@/components/data/parts.ts';
import { useActor } from '@/components/shell/actor.tsx';
import { Page } from '@/components/shell/page.tsx';
import { momentText } from '@/components/text/moments.ts';
import { partsText, sizeText } from '@/components/text/parts.ts';
import { Empty } from '@/components/ui/empty.tsx';
import { ErrorNotice } from '@/components/ui/error-notice.tsx';
import { ButtonLink } from '@/components/ui/link.tsx';
import { LinkRow, Rows } from '@/components/ui/link-row.tsx';
import { Progress } from '@/components/ui/progress.tsx';
import { Cell, Row, Stack } from '@/components/ui/stack.tsx';
import { Heading, Small } from '@/components/ui/text.tsx';
import { TextField } from '@/components/ui/text-field.tsx';
import { useUnitSystem } from '@/components/ui/unit-system.ts';
import { may } from '@/shared/policy.ts';

/** All parts of the plant. */
export function PartsScreen() {
  const actor = useActor();
  const system = useUnitSystem();
  const parts = useQuery(partsQuery());
  const [sought, setSought] = useState('');
  const add = actor && may(actor, 'part.write') && <ButtonLink kind="main" href="/parts/new" label={partsText.new} />;
  const words = sought.toLowerCase().split(/\s+/);
  const found = (parts.data ?? []).filter(({ name, fileName }) =>
    words.every((word) => `${name} ${fileName}`.toLowerCase().includes(word)),
  );
  return (
    <Page title={partsText.title} actions={add || undefined}>
      {parts.data ? (
        parts.data.length === 0 ? (
          <Empty title={partsText.empty} action={add}>
            {partsText.emptyHint}
          </Empty>
        ) : (
          <Stack gap="l">
            <TextField kind="search" label={partsText.search} value={sought} onChange={setSought} />
            {found.length === 0 ? (
              <Empty title={partsText.noneFound(sought)} />
            ) : (
              <Rows label={partsText.list}>
                {found.map((part) => (
                  <LinkRow key={part.id} href={`/parts/${part.id}`}>
                    <Row gap="xl" align="flex-start">
                      <Cell grow={3} least={220}>
                        <Heading level={3}>{part.name}</Heading>
                        <Small strong>{sizeText(part.width, part.height, system)}</Small>
                        <Small>{partsText.holds(part)}</Small>
                      </Cell>
                      <Cell grow={2} least={220}>
                        <Small>{partsText.plans(part.cornerPlans)}</Small>
                        <Small>{part.fileName}</Small>
                        <Small>{`${part.addedBy.name}, ${momentText(part.addedAt)}`}</Small>
                      </Cell>
                    </Row>
                  </LinkRow>
                ))}
              </Rows>
            )}
          </Stack>
        )
      ) : parts.isError ? (
        <ErrorNotice error={parts.error} onRetry={() => void parts.refetch()} />
      ) : (
        <Progress label={partsText.loading} />
      )}
    </Page>
  );
}
