import type { Draft } from './draft.ts';

/** Drafts with changes that are not saved, for this page's life: whoever goes to look at something else finds them again. */
const kept = new Map<string, { version: number; draft: Draft }>();

const name = (userId: string, revisionId: string) => `${userId} ${revisionId}`;

export function keepDraft(userId: string, revisionId: string, version: number, draft: Draft): void {
  kept.set(name(userId, revisionId), { version, draft });
}

export const keptDraft = (userId: string, revisionId: string) => kept.get(name(userId, revisionId)) ?? null;

export function forgetDraft(userId: string, revisionId: string): void {
  kept.delete(name(userId, revisionId));
}
