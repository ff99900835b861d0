// React Native's Animated as far as the router calls it in the web build: values that jump to where they are sent.
// Screens that animate use Reanimated; one that imports Animated from 'react-native' gets the real one.
import Image from 'react-native-web/dist/exports/Image';
import ScrollView from 'react-native-web/dist/exports/ScrollView';
import Text from 'react-native-web/dist/exports/Text';
import View from 'react-native-web/dist/exports/View';

class Value {
  constructor(value) {
    this.value = value;
  }
  setValue(value) {
    this.value = value;
  }
  interpolate() {
    return this;
  }
  addListener() {
    return '';
  }
  removeListener() {}
  removeAllListeners() {}
}

const atOnce = (value, { toValue }) => ({
  start(done) {
    value.setValue(toValue);
    done?.({ finished: true });
  },
  stop() {},
  reset() {},
});

const Animated = {
  Image,
  ScrollView,
  Text,
  View,
  Value,
  timing: atOnce,
  spring: atOnce,
  createAnimatedComponent: (component) => component,
};

export default Animated;
