import { lazy, Suspense } from 'react';
import { View } from 'react-native';
import { clock } from '../format/clock';
import { useFormats } from '../format/formats';
import { BrandMark } from '../icons/brand-mark';
import { makeStyles } from '../theme/make-styles';
import { WallText } from './wall-text';

// 9 KiB that only this view needs, and only once a code is there.
const QrCode = lazy(() => import('./qr-code').then((module) => ({ default: module.QrCode })));

export interface WallPairingProps {
  /** 'BCDF-GHJK'; null while there is none. */
  code: string | null;
  /** Instead of the code's line: asking, refused, not heard. */
  word: string;
  /** The address a phone opens, with the code in it. */
  address: string | null;
  /** When the code changes, epoch ms. */
  changesAt: number | null;
  now: number;
  /** What this screen cannot do: fall asleep. */
  notes: readonly string[];
}

/** Mean advance of the letters, em of Barlow Condensed 600; the two wide ones apart. */
const widthOf = (letter: string): number =>
  letter === 'W' ? 0.7 : letter === 'M' ? 0.6 : letter === '-' ? 0.32 : 0.46;
const codeRoom = 1690;

/** As large as the code's own letters let it be. */
export function codeSize(code: string): number {
  const ems = [...code].reduce((sum, letter) => sum + widthOf(letter), 0);
  return Math.min(450, Math.floor(codeRoom / ems));
}

/** A screen that is not paired yet: its code leads, a phone reads the rest. */
export function WallPairing({ code, word, address, changesAt, now, notes }: WallPairingProps) {
  const styles = useStyles();
  const { zone, marks } = useFormats();
  const size = codeSize(code ?? '');
  return (
    <View style={styles.page}>
      <View style={styles.head}>
        <BrandMark size={96} />
        <WallText size={84} strong>
          Bidewell
        </WallText>
        <View style={styles.grow} />
        <WallText size={84} strong>
          {clock(now, zone, marks)}
        </WallText>
      </View>
      <WallText size={64} line={72} tone="ink2" heading={1} style={styles.word}>
        {word}
      </WallText>
      <View style={styles.code} aria-label={code ? `Code ${[...code].join(' ')}` : undefined}>
        {code ? (
          <WallText size={size} line={Math.round(size * 0.76)} strong>
            {code}
          </WallText>
        ) : null}
      </View>
      <View style={styles.foot}>
        <View style={styles.how}>
          <WallText size={52} line={60} strong heading={2}>
            On a phone, as foreman or manager
          </WallText>
          <WallText size={44} line={56} tone="ink2" style={styles.under}>
            {'Scan the picture, or Workshop, Walls,\nApprove a wall, and type the code.'}
          </WallText>
          {changesAt ? (
            <WallText size={44} line={56} tone="ink2">
              {`It changes at ${clock(changesAt, zone, marks)}.`}
            </WallText>
          ) : null}
        </View>
        <View style={styles.may}>
          <WallText size={52} line={60} strong heading={2}>
            What it may
          </WallText>
          <WallText size={44} line={56} tone="ink2" style={styles.under}>
            {'Read the board of one workshop,\nnothing else. It can be taken\nback at any time.'}
          </WallText>
        </View>
        <View style={styles.qr}>
          {address ? (
            <Suspense fallback={null}>
              <QrCode text={address} size={280} label={`Address to approve this wall: ${address}`} />
            </Suspense>
          ) : null}
        </View>
      </View>
      {notes.map((note) => (
        <WallText key={note} size={30} line={38} tone="ink3" style={styles.note}>
          {note}
        </WallText>
      ))}
    </View>
  );
}

const useStyles = makeStyles(({ colors }) => ({
  page: { flex: 1, paddingHorizontal: 120 },
  head: { flexDirection: 'row', alignItems: 'center', columnGap: 28, height: 200, paddingTop: 40 },
  grow: { flex: 1 },
  word: { marginTop: 32 },
  code: { height: 340, marginTop: 24, marginBottom: 24, marginLeft: -8, justifyContent: 'center' },
  foot: { flexDirection: 'row', columnGap: 60, borderTopWidth: 2, borderTopColor: colors.line, paddingTop: 36 },
  how: { flexGrow: 1 },
  may: { flexGrow: 1 },
  under: { marginTop: 10, whiteSpace: 'pre' } as object,
  qr: { width: 280, height: 280 },
  note: { marginTop: 6 },
}));
