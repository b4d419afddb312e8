import { Link, type Href } from 'expo-router';
import type { ReactNode } from 'react';
import { StyleSheet, Text, View, type StyleProp, type ViewStyle } from 'react-native';
import { Words } from './words.tsx';

export type PlainLinkProps = {
  readonly href: Href;
  readonly children: ReactNode;
  /** Its hooks in the stylesheet. */
  readonly look?: string;
  readonly style?: StyleProp<ViewStyle>;
  /** Name of the link when its content reads badly aloud. */
  readonly spoken?: string;
  /** It leads to the page one is on. */
  readonly current?: boolean;
  /** Beside going there. */
  readonly onFollow?: () => void;
};

/** A link as the browser knows it; its look is the caller's. */
export function PlainLink({ href, children, look, style, spoken, current = false, onFollow }: PlainLinkProps) {
  return (
    <Link href={href} asChild onPress={onFollow}>
      <View
        dataSet={{ look }}
        // flat: the router merges it as an object
        style={StyleSheet.flatten(style)}
        aria-label={spoken}
        aria-current={current ? 'page' : undefined}
      >
        {children}
      </View>
    </Link>
  );
}

/** A link within words. */
export function TextLink({ href, children }: { readonly href: Href; readonly children: ReactNode }) {
  return (
    <Link href={href} asChild>
      <Text dataSet={{ look: 'link' }}>{children}</Text>
    </Link>
  );
}

/** A file of the server's to keep, under its name. */
export function FileLink({
  address,
  name,
  children,
}: {
  readonly address: string;
  readonly name: string;
  readonly children: ReactNode;
}) {
  return (
    <Text href={address} hrefAttrs={{ download: name }} dataSet={{ look: 'link' }}>
      {children}
    </Text>
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
      look={`button ${kind} ${size}`}
      style={fill ? { width: '100%' } : undefined}
      onFollow={onFollow}
    >
      <Words>{label}</Words>
    </PlainLink>
  );
}
