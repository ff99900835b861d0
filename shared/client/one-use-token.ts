/** The token of a one-use link as people paste it: the whole address, a part of it, or the bare token. Empty: none in it. */
export function tokenIn(pasted: string): string {
  const text = pasted.trim();
  const named = /[?&#]token=([A-Za-z0-9_-]+)/.exec(text)?.[1];
  if (named) return named;
  const last = text.split('/').at(-1) ?? '';
  return /^[A-Za-z0-9_-]{16,}$/.test(last) ? last : '';
}
