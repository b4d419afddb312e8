import { Children, cloneElement, isValidElement, type MouseEvent, type ReactNode } from 'react';
import { vi } from 'vitest';

/**
 * Stands in for expo-router in component tests: its CommonJS build pulls in React Native's Flow sources. Links are real
 * links, moves are recorded, the address's parameters can be set.
 */
export type Href = string | { pathname: string; params?: Record<string, string | undefined> };

export const router = { push: vi.fn(), replace: vi.fn(), back: vi.fn(), setParams: vi.fn(), canGoBack: () => false };
export const useRouter = () => router;

export const place: { pathname: string; params: Record<string, string> } = { pathname: '/', params: {} };
export const usePathname = () => place.pathname;
export const useLocalSearchParams = () => place.params;

const addressOf = (href: Href): string =>
  typeof href === 'string'
    ? href
    : `${href.pathname}?${new URLSearchParams(Object.entries(href.params ?? {}).map(([key, value]) => [key, value ?? ''])).toString()}`;

export function Link({
  href,
  asChild = false,
  onPress,
  children,
  ...rest
}: {
  href: Href;
  asChild?: boolean;
  onPress?: () => void;
  children?: ReactNode;
}) {
  const follow = {
    href: addressOf(href),
    onClick: (event: MouseEvent) => {
      event.preventDefault();
      onPress?.();
      router.push(href);
    },
  };
  const only = asChild ? Children.only(children) : null;
  return isValidElement<typeof follow>(only) ? (
    cloneElement(only, follow)
  ) : (
    <a {...rest} {...follow}>
      {children}
    </a>
  );
}

/** A redirect is told to the test by a mark in the page; the stand-in goes nowhere. */
export const Redirect = ({ href }: { href: Href }) => <i data-testid="redirect">{addressOf(href)}</i>;

export const Slot = () => null;

/** expo-router/head */
export default function Head() {
  return null;
}
