import { View } from 'react-native';
import { cardText } from '@/components/text/card.ts';
import { reserveText } from '@/components/text/pierce.ts';
import { safety } from '@/components/text/safety.ts';
import { Divider } from '@/components/ui/divider.tsx';
import { LinkRow, Rows } from '@/components/ui/link-row.tsx';
import { Notice } from '@/components/ui/notice.tsx';
import { Row, Stack } from '@/components/ui/stack.tsx';
import { Body, Figure, Heading } from '@/components/ui/text.tsx';
import { useUnitSystem } from '@/components/ui/unit-system.ts';
import type { Card } from '@/shared/cards.ts';
import { quantityText } from '@/strategy/units/index.ts';
import { cutFigures, dialTrouble, stageFigures } from './card-figures.ts';
import { FigureCells } from './figure-cells.tsx';

type Approved = Extract<Card['match'], { kind: 'approved' }>;

/** The pierce stage by stage, the cut, the corners, and what to expect of this plate. */
export function CardNumbers({ match }: { match: Approved }) {
  const system = useUnitSystem();
  const seconds = (value: number) => quantityText(value, 'time', system);
  const about = (value: number) => quantityText(value, 'time', system, { figures: 3 });
  const cutTrouble = dialTrouble(match.cut.dial);
  return (
    <Stack gap="l">
      {match.stages.map((stage, index) => {
        const trouble = dialTrouble(stage.from.dial, stage.to.dial);
        const duration = seconds(stage.duration);
        return (
          <View key={index} role="group" aria-label={cardText.stage(index + 1)} style={{ gap: 8 }}>
            <Divider strong />
            <Row justify="space-between" align="baseline">
              <Heading level={2}>{cardText.stage(index + 1)}</Heading>
              <Figure large value={duration.number} unit={duration.unit} />
            </Row>
            {trouble !== null && (
              <Notice kind="wrong" large>
                {trouble}
              </Notice>
            )}
            <FigureCells label={cardText.stage(index + 1)} cells={stageFigures(stage, system)} />
          </View>
        );
      })}
      <View role="group" aria-label={cardText.cut} style={{ gap: 8 }}>
        <Divider strong />
        <Heading level={2}>{cardText.cut}</Heading>
        {cutTrouble !== null && (
          <Notice kind="wrong" large>
            {cutTrouble}
          </Notice>
        )}
        <FigureCells label={cardText.cut} cells={cutFigures(match.cut, system)} />
      </View>
      <View style={{ gap: 8 }}>
        <Divider strong />
        <Heading level={2}>{cardText.corners}</Heading>
        {match.cornerPlans.length === 0 ? (
          <Body large>{cardText.noCorners}</Body>
        ) : (
          <Rows label={cardText.corners}>
            {match.cornerPlans.map((plan) => (
              <LinkRow key={plan.id} href={`/corner-plans/${plan.id}`}>
                <Body large strong>
                  {plan.partName}
                </Body>
                <Body large>{cardText.cornerPlan(plan)}</Body>
              </LinkRow>
            ))}
          </Rows>
        )}
      </View>
      <View style={{ gap: 8 }}>
        <Divider strong />
        <Heading level={2}>{cardText.estimates}</Heading>
        <FigureCells
          label={cardText.estimates}
          cells={[match.cold, match.hot].flatMap(({ plateTemperature, breakthrough, reserve }) => {
            const through = breakthrough === null ? null : about(breakthrough);
            return [
              {
                label: cardText.through(plateTemperature, system),
                value: through?.number ?? cardText.notThrough,
                unit: through?.unit,
              },
              { label: cardText.reserve(plateTemperature, system), value: reserveText(reserve) },
            ];
          })}
        />
        <Body large>{`${safety.estimate} ${safety.hazards} ${safety.first}`}</Body>
      </View>
    </Stack>
  );
}
