import { View } from 'react-native';
import { machinesText } from '@/components/text/machines.ts';
import { momentText } from '@/components/text/moments.ts';
import { roles } from '@/components/theme/roles.ts';
import { family } from '@/components/theme/type.ts';
import { Panel } from '@/components/ui/panel.tsx';
import { Small } from '@/components/ui/text.tsx';
import type { MachineRevision } from '@/shared/machines.ts';

/** A machine's revisions, newest first; one of them is shown beside. */
export function RevisionList({
  revisions,
  shown,
  onShow,
}: {
  readonly revisions: readonly MachineRevision[];
  readonly shown: number;
  readonly onShow: (number: number) => void;
}) {
  return (
    <Panel title={machinesText.revisions}>
      <ul style={{ listStyle: 'none', margin: 0, padding: 0 }}>
        {revisions.map((revision) => (
          <li key={revision.id} style={{ borderTop: `1px solid ${roles.rule}` }}>
            <button
              type="button"
              className="cp-row"
              aria-pressed={revision.number === shown}
              onClick={() => onShow(revision.number)}
              style={{
                display: 'block',
                width: '100%',
                minHeight: 56,
                padding: '8px 4px',
                border: 0,
                background: 'transparent',
                textAlign: 'left',
                cursor: 'pointer',
                color: revision.number === shown ? roles.ember : roles.ink,
                fontFamily: revision.number === shown ? family.readingStrong : family.reading,
                fontSize: 17,
                lineHeight: '24px',
              }}
            >
              {revision.number === shown ? '– ' : ''}
              {machinesText.revision(revision.number)}
              <View>
                <Small>{machinesText.madeBy(revision.madeBy.name, momentText(revision.madeAt))}</Small>
                {revision.note === '' ? null : <Small>{revision.note}</Small>}
              </View>
            </button>
          </li>
        ))}
      </ul>
    </Panel>
  );
}
