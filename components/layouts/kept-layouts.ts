import type { LayoutDraft } from './layout-draft.ts';

/** Layouts with changes that are not saved, for this page's life: whoever goes to look at something else finds them again. */
const kept = new Map<string, { version: number; draft: LayoutDraft }>();

const name = (userId: string, layoutId: string) => `${userId} ${layoutId}`;

export function keepLayout(userId: string, layoutId: string, version: number, draft: LayoutDraft): void {
  kept.set(name(userId, layoutId), { version, draft });
}

export const keptLayout = (userId: string, layoutId: string) => kept.get(name(userId, layoutId)) ?? null;

export function forgetLayout(userId: string, layoutId: string): void {
  kept.delete(name(userId, layoutId));
}
