import 'react-native';
import type { KeyboardEvent } from 'react';

/** What react-native-web passes on to the page and React Native's own types don't know. */
declare module 'react-native' {
  interface ViewProps {
    /** Becomes data-… attributes: the hooks of the global stylesheet. */
    readonly dataSet?: Readonly<Record<string, string | undefined>>;
    readonly href?: string;
    readonly hrefAttrs?: { readonly target?: string; readonly rel?: string };
    readonly onClick?: unknown;
    readonly 'aria-current'?: 'page';
    readonly 'aria-describedby'?: string;
    readonly 'aria-haspopup'?: 'dialog';
    readonly 'aria-invalid'?: boolean;
    readonly 'aria-level'?: number;
    readonly 'aria-orientation'?: 'horizontal' | 'vertical';
    readonly 'aria-pressed'?: boolean;
    readonly onKeyDown?: (event: KeyboardEvent<HTMLElement>) => void;
    readonly onKeyUp?: (event: KeyboardEvent<HTMLElement>) => void;
  }
  interface TextInputProps {
    readonly disabled?: boolean;
  }
  interface TextProps {
    readonly href?: string;
    readonly hrefAttrs?: { readonly download?: string };
    readonly dataSet?: Readonly<Record<string, string | undefined>>;
    readonly 'aria-level'?: number;
    readonly 'aria-live'?: 'polite' | 'assertive' | 'off';
  }
}
