export * from './types';
export { CalcInputError } from './errors';
export { isBeyondCurve, shiftCurve, slopeAtSoc, socAtVolts, voltsAtSoc } from './curve/ocv';
export { chargeThroughTerminals } from './charge-through-terminals';
export { chargeGroupByGroup } from './charge-group-by-group';
export { chargeParalleled, joinGroups } from './charge-paralleled';
export { equaliseThroughResistor } from './equalise-through-resistor';
export { joiningInrush, type JoiningInrush } from './joining-inrush';
