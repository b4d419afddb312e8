import { heatText } from '@/components/text/heat.ts';
import { Button } from '@/components/ui/button.tsx';
import { Fold } from '@/components/ui/fold.tsx';
import { Notice } from '@/components/ui/notice.tsx';
import { Progress } from '@/components/ui/progress.tsx';
import { Cell, Row, Stack } from '@/components/ui/stack.tsx';
import { Body, Small } from '@/components/ui/text.tsx';
import { TemperatureScale } from './temperature-scale.tsx';
import type { PlateHeatState } from './use-plate-heat.ts';

/** What the colours behind the drawing are, how far they are, and what went wrong with them. */
export function HeatPanel({ state }: { state: PlateHeatState }) {
  const { heat, old, working, trouble, stopped, stop, again } = state;
  return (
    <Stack gap="s">
      {working !== null && (
        <Row gap="m">
          <Cell least={180}>
            <Progress label={heatText.working} value={working} />
          </Cell>
          <Button label={heatText.stop} spoken={heatText.stopSpoken} onPress={stop} />
        </Row>
      )}
      {old && working !== null && <Notice kind="caution">{heatText.old}</Notice>}
      {(trouble !== null || stopped) && (
        <Notice kind="caution" live>
          <Body>{trouble ?? heatText.stopped}</Body>
          {heat && <Body>{heatText.keptOld}</Body>}
          <Row>
            <Button label={heatText.again} onPress={again} />
          </Row>
        </Notice>
      )}
      <TemperatureScale />
      <Small>{heatText.legend}</Small>
      <Fold label={heatText.aboutTitle}>
        <Small>{heatText.counted}</Small>
      </Fold>
    </Stack>
  );
}
