import { externalStore } from './external-store';
import type { NoticePermission } from './notice-types';

/** A charge was started on this device since the page was loaded: the moment to ask about notifications. */
export const started = externalStore(false);

/** What the device said last; null: not looked at yet. */
export const permissionStore = externalStore<NoticePermission | null>(null);
