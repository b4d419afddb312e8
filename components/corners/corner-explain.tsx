import { common, unbroken } from '@/components/text/common.ts';
import { cornerExplainText, type ReturnExplained } from '@/components/text/corner-explain.ts';
import { Dialog } from '@/components/ui/dialog.tsx';
import { EstimateNote } from '@/components/ui/estimate-note.tsx';
import { Facts } from '@/components/ui/facts.tsx';
import { Stack } from '@/components/ui/stack.tsx';
import { Body, Figure, Heading, Small } from '@/components/ui/text.tsx';

/** Where a return temperature comes from: what it is, what it adds up from, with which numbers, from which sources, and how sure it is. */
export function CornerExplainDialog({ told, onClose }: { told: ReturnExplained | null; onClose: () => void }) {
  const rows = (items: ReturnExplained['terms']) =>
    items.map(({ label, value }) => ({ label, value: unbroken(value) }));
  return (
    <Dialog title={told?.title ?? ''} open={told !== null} onClose={onClose} closeLabel={common.close}>
      {told && (
        <Stack gap="l">
          <Figure large value={told.value} />
          <Body>{told.what}</Body>
          <Stack gap="xs">
            <Heading level={3}>{cornerExplainText.terms}</Heading>
            <Facts items={rows(told.terms)} />
          </Stack>
          <Body>{told.formula}</Body>
          <Stack gap="xs">
            <Heading level={3}>{cornerExplainText.edge}</Heading>
            <Facts items={rows(told.edge)} />
            <Small>{told.edgeNote}</Small>
          </Stack>
          <Stack gap="xs">
            <Heading level={3}>{cornerExplainText.inputs}</Heading>
            <Facts items={rows(told.inputs)} />
          </Stack>
          <Stack gap="xs">
            <Heading level={3}>{cornerExplainText.standing}</Heading>
            <Facts items={rows([told.range])} />
            <Body>{told.standing}</Body>
          </Stack>
          <Stack gap="xs">
            <Heading level={3}>{cornerExplainText.sources}</Heading>
            {told.sources.map((source) => (
              <Small key={source}>{source}</Small>
            ))}
          </Stack>
          <EstimateNote />
        </Stack>
      )}
    </Dialog>
  );
}
