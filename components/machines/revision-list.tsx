import { Pressable, View } from 'react-native';
import { machinesText } from '@/components/text/machines.ts';
import { momentText } from '@/components/text/moments.ts';
import { roles } from '@/components/theme/roles.ts';
import { family } from '@/components/theme/type.ts';
import { Panel } from '@/components/ui/panel.tsx';
import { Small } from '@/components/ui/text.tsx';
import { Words } from '@/components/ui/words.tsx';
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
      <View role="list">
        {revisions.map((revision) => (
          <View key={revision.id} role="listitem" style={{ borderTopWidth: 1, borderTopColor: roles.rule }}>
            <Pressable
              role="button"
              dataSet={{ look: 'row' }}
              aria-pressed={revision.number === shown}
              onPress={() => onShow(revision.number)}
              style={{
                width: '100%',
                minHeight: 56,
                paddingVertical: 8,
                paddingHorizontal: 4,
                justifyContent: 'center',
              }}
            >
              <Words
                style={{
                  fontFamily: revision.number === shown ? family.readingStrong : family.reading,
                  fontSize: 17,
                  lineHeight: 24,
                  color: revision.number === shown ? roles.ember : roles.ink,
                }}
              >
                {`${revision.number === shown ? '– ' : ''}${machinesText.revision(revision.number)}`}
              </Words>
              <Small>{machinesText.madeBy(revision.madeBy.name, momentText(revision.madeAt))}</Small>
              {revision.note === '' ? null : <Small>{revision.note}</Small>}
            </Pressable>
          </View>
        ))}
      </View>
    </Panel>
  );
}
