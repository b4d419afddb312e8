import { useId } from 'react';
import { roles } from '@/components/theme/roles.ts';
import { family } from '@/components/theme/type.ts';

/** Something is going on: how far (0..1), or that it goes on at all when that is not known. */
export function Progress({ label, value }: { readonly label: string; readonly value?: number }) {
  const id = useId();
  return (
    <div role="status" style={{ display: 'flex', flexDirection: 'column', gap: 6 }}>
      <span id={id} style={{ fontFamily: family.reading, fontSize: 15, lineHeight: '20px', color: roles.softInk }}>
        {label}
      </span>
      <div
        role="progressbar"
        aria-labelledby={id}
        aria-valuemin={0}
        aria-valuemax={100}
        aria-valuenow={value === undefined ? undefined : Math.round(value * 100)}
        style={{ height: 4, background: roles.rule, overflow: 'hidden' }}
      >
        <div
          className={value === undefined ? 'cp-running' : undefined}
          style={{ height: 4, background: roles.ink, width: value === undefined ? '33%' : `${value * 100}%` }}
        />
      </div>
    </div>
  );
}
