/**
 * What readings of a running charge may be off, and what the model may be off under current. One standard deviation each,
 * unless said otherwise.
 *
 * All of these are guesses of the trade, set down before any log was run against them. They stand beside the spreads of the
 * plan (plan/default-spreads.ts), which the same samples carry.
 */
export const LIVE_SPREADS = {
  /**
   * What the one-RC model may be off under current, as a share of the over-voltage: it moves slowly, so that a hundred readings
   * of one hour say little more of the module than a few. One RC pair for the many of a cell: measured tapers grow slower by
   * half and more on their way.
   */
  modelRelative: 0.06,
  /** And beside it, V a group: the curve's shape between its points. */
  modelVolts: 0.001,
  /**
   * The curve along its own axis, as a share of the capacity: where a cell is empty differs from the cell of the table, and
   * where the curve is steep that is many millivolts. It came in after a measured charge from nearly empty (LMO blend, 15.3 A)
   * had been read as a capacity 8 % too high by the volts of its steep beginning. Its size is a guess: with nothing
   * it did that, and with more the bands hold more than they promise near the end of a charge.
   */
  modelSoc: 0.0045,
  /** The model's error forgets itself over this much charge, as a share of the capacity: the width of a hump of a curve. */
  modelCorrelationSoc: 0.08,
  /** Flicker of a terminal voltmeter between two looks, V, beside its last digit. */
  terminalVolts: 0.001,
  /** An ammeter is off by this share for a whole charge, */
  ammeterRelative: 0.003,
  /** and by this at each look, A. */
  ammeterAmps: 0.03,
  /** Leads that nobody has measured, as a share of what is entered. */
  leadRelative: 0.5,
  /** Leads entered as nothing on a supply that senses its own terminals: half a normal distribution of this, ohm. */
  leadUnknownOhm: 0.003,
  /** Resistance of one group of a module against another, as a share. */
  groupResistanceRelative: 0.15,
  /** Capacity of one group against another, as a share. */
  groupCapacityRelative: 0.02,
  /** A thermometer on the case at each look, K, */
  celsius: 0.7,
  /** and what the case is off from the cells, or the room drifts, K. */
  celsiusDrift: 1.5,
  /** Over this time, s. */
  celsiusDriftS: 3600,
  /** Heat that warms a module by a kelvin, J per Ah of one group and group: some 1 kJ/(kg K) and 24 g/Ah (from memory). */
  heatJoulePerKelvinAh: 24,
  /** A module comes to the temperature of its room over this, s. */
  roomS: 3 * 3600,
  /** Over-voltage left at rest, as a share of what is reckoned. */
  restOverRelative: 0.3,
  /** Beside it, V a group. */
  restVolts: 0.001,
} as const;

/** Samples of a charge that has been read. */
export const PARTICLES = 256;
