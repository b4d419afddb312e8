import Svg, { Path } from 'react-native-svg';
import { Row } from '@/components/ui/stack.tsx';
import { Body, Small } from '@/components/ui/text.tsx';
import { roles } from '@/components/theme/roles.ts';
import { stateText } from '@/components/text/pierce.ts';
import type { RevisionState } from '@/shared/strategies.ts';

/** Each state has a shape of its own; none is the caution's triangle. */
const shapes: Readonly<Record<RevisionState, { outline: string; filled?: string; colour: string }>> = {
  draft: { outline: 'M3 3H15V15H3Z', colour: roles.ink },
  inReview: { outline: 'M9 2.5a6.5 6.5 0 1 0 .01 0Z', filled: 'M9 2.5a6.5 6.5 0 0 0 0 13Z', colour: roles.cold },
  returned: { outline: 'M7 4 2.5 8.5 7 13M3 8.5H12.5a3 3 0 0 1 0 6H10', colour: roles.hot },
  approved: { outline: 'M3 3H15V15H3Z', filled: 'M3 3H15V15H3Z', colour: roles.good },
  superseded: { outline: 'M3 6.5V15H11.5M6.5 3H15V11.5H6.5Z', colour: roles.softInk },
  withdrawn: { outline: 'M9 2.5a6.5 6.5 0 1 0 .01 0ZM4.5 4.5l9 9', colour: roles.wrong },
};

/** Where a revision stands: a shape, then the word, with what belongs to it ("revision 3"). */
export function StateMark({
  state,
  detail,
  small = false,
}: {
  readonly state: RevisionState;
  readonly detail?: string;
  readonly small?: boolean;
}) {
  const { outline, filled, colour } = shapes[state];
  const words = detail === undefined ? stateText[state] : `${stateText[state]}, ${detail}`;
  return (
    <Row gap="s" wrap={false}>
      <Svg width={18} height={18} viewBox="0 0 18 18" aria-hidden style={{ flexShrink: 0 }}>
        {filled !== undefined && <Path d={filled} fill={colour} />}
        <Path d={outline} fill="none" stroke={colour} strokeWidth={1.8} />
      </Svg>
      {small ? <Small strong>{words}</Small> : <Body>{words}</Body>}
    </Row>
  );
}
