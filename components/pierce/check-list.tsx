import { checkStateText } from '@/components/text/pierce.ts';
import { roles } from '@/components/theme/roles.ts';
import { Mark } from '@/components/ui/mark.tsx';
import { Row, Stack } from '@/components/ui/stack.tsx';
import { Body } from '@/components/ui/text.tsx';
import type { Check } from '@/shared/strategies.ts';

const tone = { ok: roles.good, caution: roles.hot, wrong: roles.wrong } as const;
const order = { wrong: 0, caution: 1, ok: 2 } as const;

/** What the checks found, the worst first; each with its sign and a sentence. */
export function CheckList({ checks, large = false }: { checks: readonly Check[]; large?: boolean }) {
  return (
    <Stack gap="s">
      {[...checks]
        .sort((a, b) => order[a.state] - order[b.state])
        .map((check) => (
          <Row key={check.id} gap="m" align="flex-start" wrap={false}>
            <span
              role="img"
              aria-label={checkStateText[check.state]}
              style={{ color: tone[check.state], display: 'inline-flex', paddingTop: 1 }}
            >
              <Mark name={check.state} />
            </span>
            <Stack grow>
              <Body large={large}>{check.sentence}</Body>
            </Stack>
          </Row>
        ))}
    </Stack>
  );
}
