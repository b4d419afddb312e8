import { Link, type Href } from 'expo-router';
import type { AnchorHTMLAttributes, CSSProperties, ReactNode, Ref } from 'react';

type AnchorProps = AnchorHTMLAttributes<HTMLAnchorElement> & {
  readonly ref?: Ref<HTMLAnchorElement>;
  /** What the router hands to native parts; on the web it hands `onClick` too. */
  readonly onPress?: unknown;
};

function Anchor({ onPress: _native, children, ...rest }: AnchorProps) {
  return <a {...rest}>{children}</a>;
}

export type PlainLinkProps = {
  readonly href: Href;
  readonly children: ReactNode;
  readonly className?: string;
  readonly style?: CSSProperties;
  /** Name of the link when its content reads badly aloud. */
  readonly spoken?: string;
  /** It leads to the page one is on. */
  readonly current?: boolean;
  /** Beside going there. */
  readonly onFollow?: () => void;
};

/** A link as the browser knows it; its look is the caller's. */
export function PlainLink({ href, children, className, style, spoken, current = false, onFollow }: PlainLinkProps) {
  return (
    <Link href={href} asChild onPress={onFollow}>
      <Anchor className={className} style={style} aria-label={spoken} aria-current={current ? 'page' : undefined}>
        {children}
      </Anchor>
    </Link>
  );
}

/** A link within words. */
export function TextLink({ href, children }: { readonly href: Href; readonly children: ReactNode }) {
  return (
    <PlainLink href={href} className="cp-link">
      {children}
    </PlainLink>
  );
}

/** A link that looks like a button: it goes somewhere, a button does something. */
export function ButtonLink({
  href,
  label,
  kind = 'plain',
  size = 'usual',
  fill = false,
  onFollow,
}: {
  readonly href: Href;
  readonly label: string;
  readonly kind?: 'main' | 'plain' | 'quiet';
  readonly size?: 'usual' | 'large' | 'gloved';
  readonly fill?: boolean;
  readonly onFollow?: () => void;
}) {
  return (
    <PlainLink
      href={href}
      className={`cp-button cp-${kind} cp-${size}`}
      style={{
        display: fill ? 'flex' : 'inline-flex',
        alignItems: 'center',
        justifyContent: 'center',
        width: fill ? '100%' : undefined,
      }}
      onFollow={onFollow}
    >
      {label}
    </PlainLink>
  );
}
