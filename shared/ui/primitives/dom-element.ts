import type { ReactElement, ReactNode } from 'react';
// The one place that asks the web renderer for an element React Native has no primitive for.
// @ts-expect-error -- the renderer ships no types
import untyped from 'react-native-web/dist/exports/createElement';

const createElement = untyped as (tag: string, props: object) => ReactElement;

/** A DOM element with React Native styles and accessibility props. Web only; for controls the browser does best. */
export const domElement = (
  tag: 'select' | 'option' | 'input' | 'a' | 'img' | 'iframe',
  props: Record<string, unknown> & { children?: ReactNode; key?: string },
): ReactElement => createElement(tag, props);
