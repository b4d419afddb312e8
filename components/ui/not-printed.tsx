import type { ReactNode } from 'react';

/** Left out on paper; on the screen as if it were not there. */
export function NotPrinted({ children }: { readonly children: ReactNode }) {
  return (
    <div data-print="hide" style={{ display: 'contents' }}>
      {children}
    </div>
  );
}
