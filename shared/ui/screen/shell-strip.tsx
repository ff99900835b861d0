import { createContext, type ReactNode } from 'react';

/** The strip that the shell puts under the header of every screen inside it: no connection, since when. */
export const ShellStrip = createContext<ReactNode>(null);
