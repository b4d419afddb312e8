import type { Href } from 'expo-router';
import { View } from 'react-native';
import { momentText } from '@/components/text/moments.ts';
import { eventText, recordText, subjectText } from '@/components/text/record.ts';
import { Fold } from '@/components/ui/fold.tsx';
import { TextLink } from '@/components/ui/link.tsx';
import { Row, Stack } from '@/components/ui/stack.tsx';
import { Body, Figure, Small, Verbatim } from '@/components/ui/text.tsx';
import type { RecordEntry } from '@/shared/record.ts';

/** One entry: who did what to what, when; its facts and hash behind a fold. */
export function EntryRow({ entry }: { readonly entry: RecordEntry }) {
  const page = pageOf(entry.subject);
  return (
    <View style={{ paddingVertical: 12, paddingHorizontal: 4 }}>
      <Row align="flex-start" wrap={false} gap="l">
        <View style={{ minWidth: 40 }}>
          <Figure value={entry.sequence} tone="softInk" />
        </View>
        <Stack gap="hair" grow>
          <Body>
            <Body strong>{entry.actorName ?? recordText.somebody}</Body> {eventText(entry.event)}
          </Body>
          <Small>{momentText(entry.at)}</Small>
          {page === null ? null : (
            <Small>
              <TextLink href={page}>{`${recordText.open}: ${subjectText(entry.subject.kind)}`}</TextLink>
            </Small>
          )}
          <Fold label={recordText.facts}>
            <Verbatim>{JSON.stringify(entry.facts, null, 2)}</Verbatim>
            <Small>{`${recordText.hash} ${entry.hash}`}</Small>
          </Fold>
        </Stack>
      </Row>
    </View>
  );
}

/** The page of what an entry is about, where it has one. */
function pageOf({ kind, id }: RecordEntry['subject']): Href | null {
  switch (kind) {
    case 'machine':
      return `/machines/${id}`;
    case 'plate':
      return `/plates/${id}`;
    case 'strategy':
      return `/strategies/${id}`;
    case 'revision':
      return `/revisions/${id}`;
    case 'part':
      return `/parts/${id}`;
    case 'cornerPlan':
      return `/corner-plans/${id}`;
    case 'report':
      return `/reports/${id}`;
    case 'houseRule':
    case 'rates':
      return '/house-rules';
    default:
      return null;
  }
}
