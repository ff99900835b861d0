/** 'denied': refused for this site. 'unavailable': this browser or this address has no push. */
export type PushHere = 'on' | 'off' | 'denied' | 'unavailable';
