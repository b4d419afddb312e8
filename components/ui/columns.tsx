import { Children, type ReactNode } from 'react';

/** Things beside each other as far as they fit at a least width, px; below each other on a phone. */
export function Columns({
  children,
  least = 260,
  gap = 16,
}: {
  readonly children: ReactNode;
  readonly least?: number;
  readonly gap?: number;
}) {
  return (
    <div
      style={{
        display: 'grid',
        gap,
        alignItems: 'start',
        gridTemplateColumns: `repeat(auto-fill, minmax(min(${least}px, 100%), 1fr))`,
      }}
    >
      {Children.map(children, (child) =>
        child === null || child === undefined ? null : <div style={{ minWidth: 0 }}>{child}</div>,
      )}
    </div>
  );
}
