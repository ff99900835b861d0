// For runs from the sources: a thread does not inherit the loader of TypeScript, so it registers it first.
import { register } from 'tsx/esm/api';

register();
await import('./back-up.ts');
