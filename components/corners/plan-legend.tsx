import Svg, { Path } from 'react-native-svg';
import { hatchData } from '@/components/pierce/hatch.tsx';
import { cornerToolText } from '@/components/text/corner-preview.ts';
import { cornerText, treatmentText } from '@/components/text/corners.ts';
import { roles } from '@/components/theme/roles.ts';
import { Row } from '@/components/ui/stack.tsx';
import { Small } from '@/components/ui/text.tsx';
import { treatments, type CornerPlan } from '@/shared/corner-plans.ts';
import { TreatmentBadge } from './treatment-badge.tsx';

/** What the shapes and lines on the drawing mean; lines that it doesn't have are left out. */
export function PlanLegend({ plan: { corners } }: { plan: CornerPlan }) {
  return (
    <Row gap="l">
      {treatments.map((treatment) => (
        <Row key={treatment} gap="xs" wrap={false}>
          <TreatmentBadge treatment={treatment} />
          <Small>{treatmentText[treatment]}</Small>
        </Row>
      ))}
      <Row gap="xs" wrap={false}>
        <TreatmentBadge treatment="leave" trouble />
        <Small>{cornerText.trouble}</Small>
      </Row>
      <Row gap="xs" wrap={false}>
        <Svg width={36} height={36} aria-hidden style={{ flexShrink: 0 }}>
          <Path d="M6 18H34" stroke={roles.ember} strokeWidth={1.4} strokeDasharray="4 2.5" />
          <Path d="M6 18h0" stroke={roles.ember} strokeWidth={7} strokeLinecap="round" />
        </Svg>
        <Small>{cornerToolText.leadIn}</Small>
      </Row>
      {corners.some(({ loop }) => loop && loop.slug.length > 0) && (
        <Row gap="xs" wrap={false}>
          <Svg width={36} height={36} aria-hidden style={{ flexShrink: 0 }}>
            <Path d={hatchData(8, 8, 20, 20, 6, true)} stroke={roles.softInk} strokeWidth={1} />
            <Path d="M8 8H28V28H8Z" fill="none" stroke={roles.ember} strokeWidth={2} />
          </Svg>
          <Small>{cornerToolText.slugLegend}</Small>
        </Row>
      )}
      {corners.some(({ ease }) => ease) && (
        <Row gap="xs" wrap={false}>
          <Svg width={36} height={36} aria-hidden style={{ flexShrink: 0 }}>
            <Path d="M2 18H34" stroke={roles.ember} strokeWidth={3} strokeDasharray="9 3" />
          </Svg>
          <Small>{cornerToolText.eased}</Small>
        </Row>
      )}
    </Row>
  );
}
