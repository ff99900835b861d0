declare module 'react-native-web/dist/exports/createElement' {
  import type { ReactElement } from 'react';
  export default function createElement(tag: string, props: object): ReactElement;
}
