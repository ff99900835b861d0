// Parts of packages that every page would load and no page uses. Each is replaced by an empty module where the
// package itself gathers it; a screen that imports the part by name still gets the real one, unless the line says that
// lint forbids it. Together 40 KiB gzip.

const path = require('node:path');

const everywhere = /./;

/** from: who asks; what: the file asked for; instead: a smaller file beside it that has what is asked for. */
const leftOut = [
  // React Native's index gathers every export, and Expo Router asks for the index. Screens get `FlatList` and the
  // others straight from their own files (Expo's Babel preset sees to it), so those still work.
  {
    from: /[/\\]react-native-web[/\\]dist[/\\]index\.js$/,
    what: /[/\\]dist[/\\]exports[/\\](FlatList|SectionList|VirtualizedList|CheckBox|Switch|Picker|ProgressBar|RefreshControl|DrawerLayoutAndroid|TouchableNativeFeedback|ImageBackground)[/\\]index\.js$/,
  },
  {
    from: /[/\\]vendor[/\\]react-native[/\\]Animated[/\\]Animated\.js$/,
    what: /[/\\]components[/\\]Animated(FlatList|SectionList)\.js$/,
  },
  {
    from: /[/\\]react-native-reanimated[/\\]lib[/\\]module[/\\]Animated\.js$/,
    what: /[/\\]component[/\\]FlatList\.js$/,
  },
  // Navigators of Expo Router that we do not use, and the header of its stack: ours is the stack without a header,
  // with our own bar and rail. Lint forbids them by name; a header fails at once where it is switched on.
  {
    from: everywhere,
    what: /[/\\]expo-router[/\\]build[/\\](layouts[/\\](Tabs|TabsClient|experimental-stack[/\\]index)|views[/\\](Sitemap|useSitemap))\.js$/,
  },
  {
    from: everywhere,
    what: /[/\\]react-navigation[/\\]elements[/\\](Button|Badge|Header[/\\](Header|HeaderSearchBar|HeaderBackButton))\.js$/,
  },
  // Two views of Expo Router ask only whether they stand within a tab bar, and would take all of it along.
  {
    from: /[/\\]expo-router[/\\]build[/\\]views[/\\](ErrorBoundary|Toast)\.js$/,
    what: /[/\\]bottom-tabs[/\\]index\.js$/,
    instead: 'utils/BottomTabBarHeightContext.js',
  },
];

/**
 * What Metro is to take for a file that one of the lines above names.
 * @param origin the file that asks
 * @param file the file asked for
 * @returns a resolution for Metro, or null where the file stays
 */
function leaveOut(origin, file) {
  const line = leftOut.find(({ from, what }) => what.test(file) && from.test(origin));
  if (!line) return null;
  return line.instead
    ? { type: 'sourceFile', filePath: path.join(path.dirname(file), line.instead) }
    : { type: 'empty' };
}

module.exports = { leaveOut };
