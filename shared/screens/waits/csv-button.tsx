import { Button } from '@/shared/ui/primitives/button';
import { IconButton } from '@/shared/ui/primitives/icon-button';
import { useBreakpoint } from '@/shared/ui/theme/use-breakpoint';

const label = 'The charges, as a CSV file';

/** The charges of the page as a file, in its header. */
export const CsvButton = ({ busy, onPress }: { busy: boolean; onPress: () => void }) =>
  useBreakpoint() === 'wide' ? (
    <Button title="CSV" look="line" size="small" icon="download" label={label} busy={busy} onPress={onPress} />
  ) : (
    <IconButton icon="download" label={label} framed onPress={onPress} />
  );
