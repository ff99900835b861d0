import type { ReactNode } from 'react';
import { View } from 'react-native';
import { Surface } from '../theme/surface';
import { radius, widths } from '../theme/tokens';
import { webStyle } from '../theme/web-props';

/** The settings on the desk: their list, which stays in sight, all parts on one page, and the side column. */
export function WorkshopColumns({ nav, work, side }: { nav: ReactNode; work: ReactNode; side: ReactNode | null }) {
  return (
    <View style={{ flexDirection: 'row', columnGap: 32, alignItems: 'flex-start' }}>
      <View style={stays}>{nav}</View>
      <View style={{ flexGrow: 1, flexShrink: 1, flexBasis: 0, minWidth: 0, maxWidth: widths.workGrown, rowGap: 24 }}>
        {work}
      </View>
      {side ? (
        <Surface
          tone="sheet"
          style={{ width: 300, flexShrink: 0, borderRadius: radius.sheet, padding: 18, paddingTop: 16, rowGap: 16 }}
        >
          {side}
        </Surface>
      ) : null}
    </View>
  );
}

const stays = webStyle({ position: 'sticky', top: 0 });
