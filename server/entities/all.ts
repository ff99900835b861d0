/** All entities, listed: globs break in a bundle. */
import { AdvisedItem } from './advised-item';
import { Alert } from './alert';
import { AlertSetting } from './alert-setting';
import { AlertTurn } from './alert-turn';
import { BenchChange } from './bench-change';
import { Channel } from './channel';
import { ChannelHold } from './channel-hold';
import { Charge } from './charge';
import { ChargeEvent } from './charge-event';
import { ChargeReading } from './charge-reading';
import { Charger } from './charger';
import { CheckAnswer } from './check-answer';
import { DigestStop } from './digest-stop';
import { FinishedWait } from './finished-wait';
import { FittedSpare } from './fitted-spare';
import { IdempotencyKey } from './idempotency-key';
import { Invitation } from './invitation';
import { LevellingResistor } from './levelling-resistor';
import { LookIn } from './look-in';
import { Meter } from './meter';
import { ModuleType } from './module-type';
import { OutboxEntry } from './outbox-entry';
import { PackReading } from './pack-reading';
import { PackType } from './pack-type';
import { Person } from './person';
import { Photo } from './photo';
import { Place } from './place';
import { PushDevice } from './push-device';
import { RemovedModule } from './removed-module';
import { Repair } from './repair';
import { RepairEvent } from './repair-event';
import { RepairPerson } from './repair-person';
import { RepairWait } from './repair-wait';
import { RestCheck } from './rest-check';
import { RunStretch } from './run-stretch';
import { SecondSource } from './second-source';
import { Session } from './session';
import { Skill } from './skill';
import { Spare } from './spare';
import { SpareCapacity } from './spare-capacity';
import { SpareReading } from './spare-reading';
import { Staffing } from './staffing';
import { Wall } from './wall';
import { WallCode } from './wall-code';
import { WeeklyDigest } from './weekly-digest';
import { Work } from './work';
import { WorkStint } from './work-stint';
import { Workshop } from './workshop';

export const entities = [
  Workshop,
  Person,
  Session,
  Invitation,
  ModuleType,
  Charger,
  Channel,
  LevellingResistor,
  Meter,
  Spare,
  SpareReading,
  PackType,
  Repair,
  Charge,
  SpareCapacity,
  ChannelHold,
  FinishedWait,
  WeeklyDigest,
  DigestStop,
  RunStretch,
  ChargeReading,
  CheckAnswer,
  ChargeEvent,
  RestCheck,
  LookIn,
  Alert,
  RepairPerson,
  PackReading,
  SecondSource,
  RemovedModule,
  Photo,
  AdvisedItem,
  RepairWait,
  RepairEvent,
  Wall,
  WallCode,
  FittedSpare,
  Place,
  Skill,
  Staffing,
  Work,
  WorkStint,
  BenchChange,
  AlertTurn,
  OutboxEntry,
  PushDevice,
  AlertSetting,
  IdempotencyKey,
];
