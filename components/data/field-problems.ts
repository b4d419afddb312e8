import type { FieldPath, FieldValues, UseFormSetError } from 'react-hook-form';
import { isProblem } from './problem.ts';

/**
 * Puts the server's field errors on their fields; true when at least one found its place. A JSON pointer (RFC 6901)
 * names a field as `/profile/source/maxPower`; `under` is the part of it that the form does not have.
 */
export function applyFieldProblems<T extends FieldValues>(
  error: unknown,
  setError: UseFormSetError<T>,
  { under = '' }: { readonly under?: string } = {},
): boolean {
  if (!isProblem(error)) return false;
  let placed = false;
  for (const { pointer, detail } of error.fields) {
    const within = pointer.startsWith(under) ? pointer.slice(under.length) : pointer;
    const name = pointerPath(within);
    if (name === '') continue;
    setError(name as FieldPath<T>, { type: 'server', message: detail }, { shouldFocus: !placed }); // a name the form lacks shows nowhere, so the notice stays beside it
    placed = true;
  }
  return placed;
}

/** `/profile/source/maxPower` as the form's `profile.source.maxPower`. */
export const pointerPath = (pointer: string): string =>
  pointer
    .split('/')
    .slice(1)
    .map((part) => part.replace(/~1/g, '/').replace(/~0/g, '~'))
    .join('.');
