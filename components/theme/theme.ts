import { useThemeName } from './choice.ts';
import { roles } from './roles.ts';
import { line, space, touch } from './space.ts';
import type { ThemeName } from './tokens.ts';
import { type } from './type.ts';

export type Theme = {
  readonly name: ThemeName;
  /** Colours as CSS variables; react-native-web and svg take them as they are. */
  readonly roles: typeof roles;
  readonly type: typeof type;
  readonly space: typeof space;
  readonly line: typeof line;
  readonly touch: typeof touch;
};

/** The theme in use. Only `name` ever changes: styles that need colours alone may import `roles` and stay constant. */
export function useTheme(): Theme {
  const name = useThemeName();
  return { name, roles, type, space, line, touch };
}
