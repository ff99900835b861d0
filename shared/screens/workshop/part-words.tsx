import { Txt } from '@/shared/ui/primitives/txt';

/** Said where a part has nothing yet. */
export const NothingYet = ({ words }: { words: string }) => <Txt tone="ink2">{words}</Txt>;

/** Which meters were checked too long ago; null: none. */
export function OldChecks({ words }: { words: string | null }) {
  return words ? (
    <Txt kind="small" tone="ink2">
      {words}
    </Txt>
  ) : null;
}
