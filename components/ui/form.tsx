import type { ReactNode } from 'react';
import { space } from '@/components/theme/space.ts';

/** Fields that are sent together: Enter sends, and password managers know it for a form. */
export function Form({
  children,
  onSubmit,
  label,
}: {
  readonly children: ReactNode;
  readonly onSubmit: () => unknown;
  readonly label?: string;
}) {
  return (
    <form
      noValidate
      aria-label={label}
      onSubmit={(event) => {
        event.preventDefault();
        event.stopPropagation(); // a form in a dialog stands inside the page's form in React's tree
        onSubmit();
      }}
      style={{ display: 'flex', flexDirection: 'column', gap: space.l, margin: 0 }}
    >
      {children}
    </form>
  );
}
