import { Link, type Href } from 'expo-router';
import type { ReactNode } from 'react';

/** A link within words. */
export function TextLink({ href, children }: { readonly href: Href; readonly children: ReactNode }) {
  return (
    <Link href={href} className="cp-link">
      {children}
    </Link>
  );
}

/** A link that looks like a button: it goes somewhere, a button does something. */
export function ButtonLink({
  href,
  label,
  kind = 'plain',
  size = 'usual',
  fill = false,
}: {
  readonly href: Href;
  readonly label: string;
  readonly kind?: 'main' | 'plain' | 'quiet';
  readonly size?: 'usual' | 'large' | 'gloved';
  readonly fill?: boolean;
}) {
  return (
    <Link href={href} asChild>
      <a
        className="cp-button"
        data-kind={kind}
        data-size={size}
        style={{ display: 'block', width: fill ? '100%' : undefined }}
      >
        {label}
      </a>
    </Link>
  );
}
