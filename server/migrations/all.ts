/** All migrations in their order, listed: globs break in a bundle. */
import { Initial1764600000000 } from './1764600000000-initial';
import { NeighbourSpare1764700000000 } from './1764700000000-neighbour-spare';
import { AlertPassed1764800000000 } from './1764800000000-alert-passed';
import { EarlyCheck1764900000000 } from './1764900000000-early-check';
import { SpareCapacity1765000000000 } from './1765000000000-spare-capacity';
import { Behaviours1765100000000 } from './1765100000000-behaviours';
import { ReadingPlace1765200000000 } from './1765200000000-reading-place';
import { Repairs1765300000000 } from './1765300000000-repairs';
import { Advised1765500000000 } from './1765500000000-advised';
import { Photos1765550000000 } from './1765550000000-photos';
import { CustomerErased1765600000000 } from './1765600000000-customer-erased';
import { PackBalance1765800000000 } from './1765800000000-pack-balance';
import { FittedSpare1765810000000 } from './1765810000000-fitted-spare';
import { BenchPlan1765900000000 } from './1765900000000-bench-plan';
import { AlertDelivery1767000000000 } from './1767000000000-alert-delivery';
import { ChannelFault1767100000000 } from './1767100000000-channel-fault';
import { FinishedWaits1767110000000 } from './1767110000000-finished-waits';
import { ChargeTopUp1767310000000 } from './1767310000000-charge-top-up';
import { WeeklyDigest1767200000000 } from './1767200000000-weekly-digest';

export const migrations = [
  Initial1764600000000,
  NeighbourSpare1764700000000,
  AlertPassed1764800000000,
  EarlyCheck1764900000000,
  SpareCapacity1765000000000,
  Behaviours1765100000000,
  ReadingPlace1765200000000,
  Repairs1765300000000,
  Advised1765500000000,
  Photos1765550000000,
  CustomerErased1765600000000,
  PackBalance1765800000000,
  FittedSpare1765810000000,
  BenchPlan1765900000000,
  AlertDelivery1767000000000,
  ChannelFault1767100000000,
  FinishedWaits1767110000000,
  WeeklyDigest1767200000000,
  ChargeTopUp1767310000000,
];
