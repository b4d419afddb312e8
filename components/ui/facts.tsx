import type { ReactNode } from 'react';
import { roles } from '@/components/theme/roles.ts';
import { family } from '@/components/theme/type.ts';

/** Name and value in two columns, for a profile or a list of facts. */
export function Facts({ items }: { readonly items: readonly { readonly label: string; readonly value: ReactNode }[] }) {
  return (
    <dl style={{ margin: 0, display: 'flex', flexDirection: 'column' }}>
      {items.map(({ label, value }) => (
        <div
          key={label}
          style={{
            display: 'flex',
            justifyContent: 'space-between',
            alignItems: 'baseline',
            gap: 16,
            padding: '7px 0',
            borderTop: `1px solid ${roles.rule}`,
          }}
        >
          <dt style={{ fontFamily: family.reading, fontSize: 16, lineHeight: '22px', color: roles.softInk }}>
            {label}
          </dt>
          <dd
            style={{
              margin: 0,
              textAlign: 'right',
              fontFamily: family.figure,
              fontSize: 19,
              lineHeight: '24px',
              color: roles.ink,
              fontVariantNumeric: 'tabular-nums',
            }}
          >
            {value}
          </dd>
        </div>
      ))}
    </dl>
  );
}
