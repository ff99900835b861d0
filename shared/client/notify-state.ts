import { externalStore } from './external-store';

/** A charge was started on this device since the page was loaded: the moment to ask about notifications. */
export const started = externalStore(false);
