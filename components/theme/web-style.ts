import type { CSSProperties } from 'react';

/** Styles that the browser knows and React Native's types don't (grids, sticky places, `ch`): react-native-web hands them on. */
export const webStyle = (style: CSSProperties): object => style;
