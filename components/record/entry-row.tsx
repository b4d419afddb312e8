import type { Href } from 'expo-router';
import { momentText } from '@/components/text/moments.ts';
import { eventText, recordText, subjectText } from '@/components/text/record.ts';
import { roles } from '@/components/theme/roles.ts';
import { family } from '@/components/theme/type.ts';
import { TextLink } from '@/components/ui/link.tsx';
import { Row, Stack } from '@/components/ui/stack.tsx';
import { Body, Figure, Small } from '@/components/ui/text.tsx';
import type { RecordEntry } from '@/shared/record.ts';

/** One entry: who did what to what, when; its facts and hash behind a fold. */
export function EntryRow({ entry }: { readonly entry: RecordEntry }) {
  const page = pageOf(entry.subject);
  return (
    <div style={{ padding: '12px 4px' }}>
      <Row align="flex-start" wrap={false} gap="l">
        <div style={{ minWidth: 40 }}>
          <Figure value={entry.sequence} tone="softInk" />
        </div>
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
          <details>
            <summary style={styles.summary}>{recordText.facts}</summary>
            <pre style={styles.facts}>{JSON.stringify(entry.facts, null, 2)}</pre>
            <Small>{`${recordText.hash} ${entry.hash}`}</Small>
          </details>
        </Stack>
      </Row>
    </div>
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
      return '/house-rules';
    default:
      return null;
  }
}

const styles = {
  summary: {
    minHeight: 48,
    display: 'flex',
    alignItems: 'center',
    cursor: 'pointer',
    fontFamily: family.reading,
    fontSize: 15,
    color: roles.softInk,
    textDecoration: 'underline',
    textUnderlineOffset: 3,
  },
  facts: {
    margin: '0 0 8px',
    padding: 12,
    background: roles.sheet,
    border: `1px solid ${roles.rule}`,
    borderRadius: 3,
    fontSize: 14,
    lineHeight: '20px',
    color: roles.ink,
    whiteSpace: 'pre-wrap',
    overflowWrap: 'anywhere',
  },
} as const;
