/**
 * What a rest is made of here: exponentials with time constants a factor of 2 apart, each as likely to matter as the next.
 *
 * Such an even mixture over the logarithm of the time constant has the property that is measured: what is still to come at
 * the time t falls with a time constant of about t itself, so the late time constant grows in proportion to the time rested
 * (L. Pei et al., J. Power Sources 253 (2014) 412–418, abstract). Rests of two or three exponentials are among it.
 */
export const TIME_CONSTANTS_S: readonly number[] = [14, 28, 56, 112, 225, 450, 900, 1800, 3600, 7200];

/**
 * How large each may be beside the others. The slowest is held down: after 3 h a rest is done on NMC 532 and LFP, while NCA
 * still moves after a day (D. Theuerkauf, L. Swan, Batteries 8 (2022) 77, abstract). The size is a guess.
 */
export const RELATIVE_SCALES: readonly number[] = [1, 1, 1, 1, 1, 1, 1, 1, 1, 0.3];

/** Share of each exponential that is left after so many seconds of rest. */
export const sharesLeft = (s: number): number[] => TIME_CONSTANTS_S.map((tau) => Math.exp(-s / tau));

/**
 * One exponential's over-voltage before anything is read: one standard deviation, V. All are thought of, equally likely; the
 * readings tell which. A guess: rests of an LMO-blend cell have 20 to 50 mV in all after C/3 (batterysim/equiv-circ-model).
 */
export const OVER_SCALES_VOLTS: readonly number[] = [0.0002, 0.0005, 0.001, 0.002, 0.004, 0.008, 0.016];

/** Correlation between them: over-voltages of one rest mostly have one sign. A guess. */
export const OVER_CORRELATION = 0.5;
