import { reviewText } from '@/components/text/pierce.ts';
import { momentText } from '@/components/text/moments.ts';
import { Stack } from '@/components/ui/stack.tsx';
import { Body, Small } from '@/components/ui/text.tsx';
import type { Revision } from '@/shared/strategies.ts';

/** What happened to a revision, oldest first: who, when, in which words. */
export function History({ revision }: { revision: Revision }) {
  if (revision.reviews.length === 0) return <Small>{reviewText.none}</Small>;
  return (
    <Stack gap="m">
      {revision.reviews.map((review) => (
        <Stack key={review.id} gap="xs">
          <Body strong>{reviewText.verdict[review.verdict](review.by.name)}</Body>
          <Small>{momentText(review.at)}</Small>
          {review.words !== '' && <Body>{reviewText.quoted(review.words)}</Body>}
        </Stack>
      ))}
    </Stack>
  );
}
