import { and, desc, eq, inArray } from 'drizzle-orm';
import type { Transaction } from '../../db/database.ts';
import { reviews } from '../../db/schema/reviews.ts';
import { revisionAuthors } from '../../db/schema/revision-authors.ts';
import { reviewEndpoints } from '../../shared/strategies.ts';
import { namesOf } from '../people/names.ts';
import type { Mount } from '../route.ts';
import { presentSummary } from '../strategies/present.ts';
import { linesInReview, standing } from '../strategies/repository.ts';

export function reviewRoutes({ route }: Mount): void {
  route(reviewEndpoints.list, async ({ tx }) => {
    const lines = await linesInReview(tx);
    const ids = lines.map((line) => line.id);
    const stand = await standing(
      tx,
      lines.map((line) => line.strategyId),
    );
    const { submitted, authors } = await handedIn(tx, ids);
    const names = await namesOf(tx);
    return {
      body: {
        items: lines.map((line) => {
          const by = submitted.get(line.id);
          return {
            ...presentSummary(line, stand, names),
            submittedAt: (by?.at ?? line.changedAt).toISOString(),
            submittedBy: names(by?.by ?? line.changedBy),
            touchedBy: authors.filter((author) => author.revisionId === line.id).map((author) => names(author.userId)),
          };
        }),
      },
    };
  });
}

async function handedIn(tx: Transaction, revisionIds: readonly string[]) {
  if (revisionIds.length === 0) return { submitted: new Map<string, typeof reviews.$inferSelect>(), authors: [] };
  const ids = [...revisionIds];
  const submissions = await tx
    .select()
    .from(reviews)
    .where(and(inArray(reviews.revisionId, ids), eq(reviews.verdict, 'submitted')))
    .orderBy(desc(reviews.at));
  const authors = await tx.select().from(revisionAuthors).where(inArray(revisionAuthors.revisionId, ids));
  return { submitted: new Map(submissions.map((row) => [row.revisionId, row])), authors };
}
