import { useState } from 'react';
import { View } from 'react-native';
import { checksText, checkStateText } from '@/components/text/pierce.ts';
import { Button } from '@/components/ui/button.tsx';
import { Mark } from '@/components/ui/mark.tsx';
import { Row, Stack } from '@/components/ui/stack.tsx';
import { Body } from '@/components/ui/text.tsx';
import type { Check } from '@/shared/strategies.ts';

const tone = { ok: 'good', caution: 'hot', wrong: 'wrong' } as const;

/** What the checks found: what is not in order first and always in sight, the rest when asked for. */
export function CheckList({ checks }: { checks: readonly Check[] }) {
  const [open, setOpen] = useState(false);
  const wrong = checks.filter(({ state }) => state === 'wrong');
  const cautions = checks.filter(({ state }) => state === 'caution');
  const ok = checks.filter(({ state }) => state === 'ok');
  const clear = wrong.length + cautions.length === 0;
  return (
    <Stack gap="s">
      {clear && <Line state="ok" sentence={checksText.allInOrder(ok.length)} />}
      {[...wrong, ...cautions, ...(open ? ok : [])].map((check, index) => (
        <Line key={`${check.id} ${index}`} state={check.state} sentence={check.sentence} />
      ))}
      {ok.length > 0 && (
        <Row>
          <Button
            kind="quiet"
            expanded={open}
            label={open ? checksText.hide : checksText.inOrder(ok.length)}
            onPress={() => setOpen(!open)}
          />
        </Row>
      )}
    </Stack>
  );
}

function Line({ state, sentence }: Omit<Check, 'id'>) {
  return (
    <Row gap="m" align="flex-start" wrap={false}>
      <View role="img" aria-label={checkStateText[state]} style={{ paddingTop: 1 }}>
        <Mark name={state} tone={tone[state]} />
      </View>
      <Stack grow>
        <Body>{sentence}</Body>
      </Stack>
    </Row>
  );
}
