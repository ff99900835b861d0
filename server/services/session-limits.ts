const minute = 60_000;
const day = 24 * 60 * minute;

/** Life of an access token, ms. */
export const accessLifeMs = 10 * minute;
/** A session ends by itself after this, whatever is done. */
export const sessionLifeMs = 30 * day;
/** A session nobody used for this long is over. */
export const sessionIdleMs = 14 * day;
/** A retry with the token before the last one gets the same successor within this time: its answer may have been lost. */
export const refreshGraceMs = 20_000;
/** Invitations and reset links. */
export const linkLifeMs = 72 * 60 * minute;
/** The longest a browser keeps a cookie; a wall's own right has no end. */
export const wallCookieLifeMs = 400 * day;
