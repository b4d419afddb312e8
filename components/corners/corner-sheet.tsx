import { View } from 'react-native';
import { cornerToolText } from '@/components/text/corner-preview.ts';
import { asSentence, cornerText, runnerUpWords, treatmentText } from '@/components/text/corners.ts';
import { roles } from '@/components/theme/roles.ts';
import { space } from '@/components/theme/space.ts';
import { Button } from '@/components/ui/button.tsx';
import { Divider } from '@/components/ui/divider.tsx';
import { Notice } from '@/components/ui/notice.tsx';
import { Panel } from '@/components/ui/panel.tsx';
import { Cell, Row, Stack } from '@/components/ui/stack.tsx';
import { Body, Figure, Heading, Small } from '@/components/ui/text.tsx';
import { useUnitSystem } from '@/components/ui/unit-system.ts';
import type { CornerPlan, PlannedCorner, Treatment } from '@/shared/corner-plans.ts';
import { quantityText } from '@/strategy/units/index.ts';
import { CornerHeat } from './corner-heat.tsx';
import { TemperatureFigure } from './temperature-scale.tsx';
import { TreatmentBadge } from './treatment-badge.tsx';

type CornerSheetProps = {
  corner: PlannedCorner;
  number: number;
  plan: Pick<CornerPlan, 'part' | 'cutting' | 'plateTemperature' | 'corners' | 'thickness' | 'limit'>;
  /** None for who only reads. */
  onOverride: ((treatment: Treatment | null) => void) | null;
  busy: boolean;
  /** To the corner before (−1) or after (+1); none at the ends. */
  onTurn: (by: -1 | 1) => void;
  first: boolean;
  last: boolean;
  onShow: () => void;
  onClose: () => void;
  /** Within a sheet that has its own frame. */
  framed?: boolean;
};

/** All about one corner: angle, return temperature without and with its treatment, what else would do and why not. */
export function CornerSheet({
  corner,
  number,
  plan,
  onOverride,
  busy,
  onTurn,
  first,
  last,
  onShow,
  onClose,
  framed = true,
}: CornerSheetProps) {
  const system = useUnitSystem();
  const length = (metres: number) => quantityText(metres, 'length', system, { figures: 3 }).text;
  const burnt = (metres: number) => (metres < 1e-5 ? cornerText.notBurnt : length(metres));
  const seconds = (value: number) => quantityText(value, 'time', system, { figures: 3 }).text;
  const hot = (kelvin: number) => quantityText(kelvin, 'temperature', system, { decimals: 0 }).text;
  const share = (value: number) => quantityText(value, 'ratio', system).text;
  const facts: { label: string; kelvin?: number; text?: string }[] = [
    { label: cornerText.without, kelvin: corner.untreated },
    { label: cornerText.with, kelvin: corner.treated },
    { label: cornerText.straight, kelvin: corner.straightEdge },
    { label: cornerText.limit, kelvin: plan.limit },
    ...(corner.background == null ? [] : [{ label: cornerText.background, kelvin: corner.background }]),
    ...(corner.peak == null ? [] : [{ label: cornerText.peak, kelvin: corner.peak }]),
    ...(corner.burnBack == null ? [] : [{ label: cornerText.burnBack, text: burnt(corner.burnBack) }]),
    ...(corner.returnTime == null ? [] : [{ label: cornerText.returnTime, text: seconds(corner.returnTime) }]),
    { label: cornerText.added, text: seconds(corner.addedTime) },
    ...(corner.loop
      ? [
          {
            label: cornerText.loopSize,
            text: (corner.loop.shape === 'flat' ? cornerText.flatLoopOf : cornerText.loopOf)(
              length(corner.loop.radius),
              length(corner.loop.extension),
              length(corner.loop.length),
            ),
          },
          { label: cornerText.slug, text: cornerText.slugArea(corner.loop.slugArea) },
        ]
      : []),
    ...(corner.dwell === null ? [] : [{ label: cornerText.dwellFor, text: seconds(corner.dwell) }]),
    ...(corner.ease
      ? [
          {
            label: cornerText.easeOver,
            text: cornerText.easeOf(length(corner.ease.before), length(corner.ease.after)),
          },
          {
            label: cornerText.easeTo,
            text: cornerText.easeShares(share(corner.ease.feedShare), share(corner.ease.powerShare)),
          },
        ]
      : []),
    ...(corner.round
      ? [
          {
            label: cornerText.roundSize,
            text: cornerText.roundOf(length(corner.round.radius), length(corner.round.deviation)),
          },
        ]
      : []),
  ];
  const Frame = framed ? Panel : Stack;
  return (
    <Frame>
      <Row gap="s" wrap={false}>
        <TreatmentBadge treatment={corner.treatment} trouble={corner.trouble !== null} size={44} />
        <Stack gap="hair" grow>
          {framed && <Small>{cornerText.row(number)}</Small>}
          <Heading level={2}>{`${treatmentText[corner.treatment]}, ${cornerText.angle(corner.angle)}`}</Heading>
        </Stack>
      </Row>
      <Row gap="s">
        <Button label="←" spoken={cornerToolText.cornerBefore} disabled={first} onPress={() => onTurn(-1)} />
        <Button label="→" spoken={cornerToolText.cornerAfter} disabled={last} onPress={() => onTurn(1)} />
        <Button label={cornerToolText.show} spoken={cornerToolText.showOnDrawing} onPress={onShow} />
        <Button kind="quiet" label={cornerText.close} onPress={onClose} />
      </Row>
      {corner.trouble !== null && <Notice kind="caution">{asSentence(corner.trouble)}</Notice>}
      {corner.caution && <Notice kind="caution">{asSentence(corner.caution)}</Notice>}
      <Body>{`${cornerText.chosenBy[corner.chosenBy]} ${asSentence(corner.why)}`}</Body>
      <View>
        {facts.map((fact) => (
          <View key={fact.label} style={factRow}>
            <Cell>
              <Small>{fact.label}</Small>
            </Cell>
            {fact.kelvin === undefined ? (
              <View style={factText}>
                <Small strong align="right">
                  {fact.text}
                </Small>
              </View>
            ) : (
              <TemperatureFigure kelvin={fact.kelvin} />
            )}
          </View>
        ))}
      </View>
      <CornerHeat plan={plan} corner={corner} number={number} />
      <Heading level={3}>{cornerText.options}</Heading>
      {corner.runnerUp && <Body>{runnerUpWords(corner.runnerUp, seconds)}</Body>}
      {corner.options.map((option) => (
        <Stack key={option.treatment} gap="xs">
          <Divider />
          <Row justify="space-between" gap="s">
            <Row gap="s" wrap={false}>
              <TreatmentBadge treatment={option.treatment} />
              <Stack gap="hair">
                <Body strong>{treatmentText[option.treatment]}</Body>
                <Small>{option.fits ? cornerText.fits : cornerText.doesNotFit}</Small>
              </Stack>
            </Row>
            <Row gap="m" wrap={false}>
              {option.returnTemperature !== null && <TemperatureFigure kelvin={option.returnTemperature} />}
              {option.addedTime !== null && (
                <Figure value={`${option.addedTime < 0 ? '−' : '+'}${seconds(Math.abs(option.addedTime))}`} />
              )}
            </Row>
          </Row>
          <Body>{asSentence(option.why)}</Body>
          {option.peak != null && (
            <Small>
              {cornerText.afterwards(
                hot(option.peak),
                option.burnBack == null || option.burnBack < 1e-5 ? null : length(option.burnBack),
              )}
            </Small>
          )}
          {onOverride && option.treatment !== corner.treatment && (
            <Row>
              <Button
                label={cornerText.choose[option.treatment]}
                busy={busy}
                disabled={!option.fits}
                onPress={() => onOverride(option.treatment)}
              />
            </Row>
          )}
        </Stack>
      ))}
      {onOverride && corner.chosenBy === 'person' && (
        <Button kind="quiet" label={cornerText.byRule} busy={busy} onPress={() => onOverride(null)} />
      )}
    </Frame>
  );
}

const factRow = {
  flexDirection: 'row',
  justifyContent: 'space-between',
  alignItems: 'center',
  gap: space.m,
  minHeight: 32,
  borderBottomWidth: 1,
  borderBottomColor: roles.rule,
} as const;

const factText = { flexShrink: 1, maxWidth: '65%' } as const;
