import type { ReactNode } from 'react';
import { StyleSheet, useWindowDimensions, View } from 'react-native';
import { makeStyles } from '../theme/make-styles';
import { webStyle } from '../theme/web-props';

/** The picture every measure of the wall is for. */
export const wallPicture = { width: 1920, height: 1080 } as const;

/** How much larger or smaller a window shows the picture, and how much room there is in the picture's own px. */
export function stageOf(window: { width: number; height: number }): { scale: number; width: number; height: number } {
  const scale = Math.min(window.width / wallPicture.width, window.height / wallPicture.height) || 1;
  return {
    scale,
    width: Math.max(wallPicture.width, window.width / scale),
    height: Math.max(wallPicture.height, window.height / scale),
  };
}

/** The stage in px of the picture; children lay themselves out on at least 1920 × 1080. */
export const useStage = () => stageOf(useWindowDimensions());

/** Scales the picture to the window. `shift` moves it against burn-in. */
export function WallStage({ shift, children }: { shift: { x: number; y: number }; children: ReactNode }) {
  const themed = useStyles();
  const { scale, width, height } = useStage();
  return (
    <View role="main" style={[styles.window, themed.ground]}>
      <View
        style={[
          styles.picture,
          webStyle({
            width,
            height,
            transformOrigin: '0 0',
            transform: `scale(${scale}) translate(${shift.x}px, ${shift.y}px)`,
          }),
        ]}
      >
        {children}
      </View>
    </View>
  );
}

const styles = StyleSheet.create({
  window: { flex: 1, overflow: 'hidden' },
  picture: { position: 'absolute', left: 0, top: 0 },
});
const useStyles = makeStyles(({ colors }) => ({ ground: { backgroundColor: colors.ground } }));
