import { asSentence } from '@/components/text/corners.ts';
import { summaryText } from '@/components/text/corner-summary.ts';
import { Divider } from '@/components/ui/divider.tsx';
import { TextLink } from '@/components/ui/link.tsx';
import { Panel } from '@/components/ui/panel.tsx';
import { Stack } from '@/components/ui/stack.tsx';
import { Body, Small } from '@/components/ui/text.tsx';
import { useUnitSystem } from '@/components/ui/unit-system.ts';
import type { CornerPlan } from '@/shared/corner-plans.ts';
import { quantityText } from '@/strategy/units/index.ts';

/** Contours named in a row at most; of a long order the rest says nothing new. */
const mostNamed = 12;

/** Orders that come back later to what is hot: what each costs and spares. In a layout the order is changed there. */
export function OrderSuggestions({ plan, mayWrite }: { plan: CornerPlan; mayWrite: boolean }) {
  const system = useUnitSystem();
  const suggestions = plan.totals.orderSuggestions ?? [];
  if (suggestions.length === 0) return null;
  const time = (seconds: number) => quantityText(seconds, 'time', system, { figures: 2 }).text;
  const words = summaryText.suggestions;
  return (
    <Panel title={words.title}>
      {suggestions.map(({ why, rapidTime, addedTime, overLimit, order }, i) => (
        <Stack key={order.join(' ')} gap="xs">
          {i > 0 && <Divider />}
          <Body>{asSentence(why)}</Body>
          <Body strong>
            {[
              words.costs(time(rapidTime)),
              ...(addedTime > 0 ? [words.spares(time(addedTime))] : []),
              ...(overLimit > 0 ? [words.fewer(overLimit)] : []),
            ].join('; ')}
          </Body>
          <Small>{words.order(`${order.slice(0, mostNamed).join(', ')}${order.length > mostNamed ? ' …' : ''}`)}</Small>
        </Stack>
      ))}
      {plan.layout && mayWrite && <TextLink href={`/layouts/${plan.layout.id}`}>{words.inLayout}</TextLink>}
    </Panel>
  );
}
