import type { ReactNode } from 'react';
import { proposeText } from '@/components/text/pierce-designer.ts';
import { Notice } from '@/components/ui/notice.tsx';
import { Body } from '@/components/ui/text.tsx';
import type { PierceProposal } from '@/strategy/pierce/index.ts';

type InTheWayProps = { proposal: PierceProposal & { kind: 'none' }; children: ReactNode };

/** No routine keeps all that was asked: which limit is in the way, what would have to give, and what can be done now. */
export function InTheWay({ proposal: { why, inTheWay }, children }: InTheWayProps) {
  return (
    <Notice kind="caution" title={proposeText.none} live>
      {inTheWay.length === 0 ? (
        <Body>{why}</Body>
      ) : (
        <>
          <Body strong>{proposeText.gives}</Body>
          {inTheWay.map(({ sentence }) => (
            <Body key={sentence}>{sentence}</Body>
          ))}
        </>
      )}
      {children}
    </Notice>
  );
}
