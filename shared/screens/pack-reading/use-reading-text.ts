import { useEffect, useMemo, useState } from 'react';
import type { ReadingText, ReadingWish } from '@/shared/ui/pack-reading/reading-text';

type Reader = (text: string, wish: ReadingWish) => ReadingText;

/** A pasted or chosen table as it was understood; null while nothing stands there or the parser is being fetched. */
export function useReadingText(
  text: string,
  { groupCount, separator, unit }: ReadingWish,
): { read: ReadingText | null; failed: boolean } {
  const [reader, setReader] = useState<{ read: Reader } | null>(null);
  const [failed, setFailed] = useState(false);
  const wanted = text.trim() !== '';
  useEffect(() => {
    if (!wanted || reader) return;
    let gone = false;
    import('@/shared/ui/pack-reading/reading-text').then(
      ({ readReadingText }) => (gone ? undefined : setReader({ read: readReadingText })),
      () => (gone ? undefined : setFailed(true)),
    );
    return () => {
      gone = true;
    };
  }, [wanted, reader]);
  const read = useMemo(
    () => (wanted && reader ? reader.read(text, { groupCount, separator, unit }) : null),
    [wanted, reader, text, groupCount, separator, unit],
  );
  return { read, failed };
}
