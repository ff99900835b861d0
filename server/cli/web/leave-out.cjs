// Parts of packages that every page would load and no page uses. Each is replaced by an empty module, or by a small file
// of ours with what is really called, where the package itself gathers it. A screen that imports such a part by name
// still gets the real one, or lint forbids it (`eslint.config.mjs`). tests/e2e/web-build.e2e.ts looks at what was built:
// no module may ask React Native's index for a part that is left out of it. Together about 65 KiB gzip.

const path = require('node:path');

const everywhere = /./;
const ours = (name) => path.join(__dirname, name);

/** Exports of React Native Web that its index does not gather. */
const leftOutOfIndex = [
  'Button',
  'CheckBox',
  'Clipboard',
  'DrawerLayoutAndroid',
  'FlatList',
  'ImageBackground',
  'InteractionManager',
  'KeyboardAvoidingView',
  'LayoutAnimation',
  'LogBox',
  'PanResponder',
  'Picker',
  'ProgressBar',
  'RefreshControl',
  'SectionList',
  'Share',
  'Switch',
  'TouchableHighlight',
  'TouchableNativeFeedback',
  'TouchableOpacity',
  'TouchableWithoutFeedback',
  'Vibration',
  'VirtualizedList',
];

const routerParts = [
  // Navigators and links that we do not use: ours is the stack without a header, with our own bar and rail.
  'layouts/(Tabs|TabsClient|experimental-stack/index)',
  'layouts/stack-utils/toolbar/index',
  'link/(LinkWithPreview|preview/HrefPreview)',
  // Shown while developing only.
  'views/(Sitemap|useSitemap|Toast)',
  // A header fails at once where it is switched on.
  'react-navigation/elements/(Button|Badge|Header/(Header|HeaderSearchBar|HeaderBackButton))',
  // Navigation declared without files, and on a server.
  'react-navigation/core/StaticNavigation',
  'react-navigation/native/(createStaticNavigation|ServerContainer)',
  'react-navigation/routers/DrawerRouter',
];

const file = (pattern) => new RegExp(`/${pattern}\\.js$`);

/** from: who asks; what: the file asked for; instead: a file that has what is really called. */
const leftOut = [
  // Expo Router asks for React Native's index, which gathers everything. Screens get `FlatList` and the others straight
  // from their own files (Expo's Babel preset sees to it), so those still work.
  { from: file('react-native-web/dist/index'), what: file(`dist/exports/(${leftOutOfIndex.join('|')})/index`) },
  // The router animates nothing of ours: its own bars and headers are not drawn.
  {
    from: file('(react-native-web/dist/index|react-native-screens/lib/module/components/Screen\\.web)'),
    what: file('dist/exports/Animated/index'),
    instead: ours('still-animated.mjs'),
  },
  { from: file('react-native-reanimated/lib/module/Animated'), what: file('component/FlatList') },
  { from: everywhere, what: file(`expo-router/build/(${routerParts.join('|')})`) },
  // Titles come from the stack's options; nothing else is put into the page's head.
  { from: everywhere, what: file('expo-router/vendor/react-helmet-async/lib/index'), instead: ours('no-helmet.mjs') },
  // The error view asks only whether it stands within a tab bar, and would take all of it along.
  {
    from: file('expo-router/build/views/ErrorBoundary'),
    what: file('bottom-tabs/index'),
    instead: path.join(
      __dirname,
      '../../../node_modules/expo-router/build/react-navigation/bottom-tabs/utils/BottomTabBarHeightContext.js',
    ),
  },
];

/**
 * What Metro is to take for a file that one of the lines above names.
 * @param origin the file that asks
 * @param asked the file asked for
 * @returns a resolution for Metro, or null where the file stays
 */
function leaveOut(origin, asked) {
  const [from, what] = [origin, asked].map((each) => each.replaceAll('\\', '/'));
  const line = leftOut.find((each) => each.what.test(what) && each.from.test(from));
  if (!line) return null;
  return line.instead ? { type: 'sourceFile', filePath: line.instead } : { type: 'empty' };
}

module.exports = { leaveOut, leftOutOfIndex };
