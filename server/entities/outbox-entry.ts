import { Check, Column, Entity, ForeignKey, Index, PrimaryColumn, Unique } from 'typeorm';
import type { SentWay } from '@/shared/contract/alert-settings';
import {
  idColumn,
  instantColumn,
  jsonColumn,
  optionalInstantColumn,
  optionalTextColumn,
  textColumn,
  wholeColumn,
} from './columns';
import { Alert } from './alert';
import { Person } from './person';
import { Workshop } from './workshop';

/** A push of a phone that its service has accepted and whose receipt is still to come. */
export interface PushTicket {
  deviceId: string;
  ticketId: string;
}

/**
 * One alert to one person by one way, written with what raised the alert and brought there after the commit. `waiting`
 * goes out when it is due; `sent` was accepted; `dead` was given up and is shown to the manager; `dropped` is not needed
 * any more.
 */
@Entity({ name: 'outbox_entry' })
@Unique('uq_outbox_entry', ['alertId', 'turn', 'personId', 'way'])
@Index('ix_outbox_due', ['state', 'dueAt'])
@Index('ix_outbox_receipt', ['receiptDueAt'])
@Index('ix_outbox_state', ['workshopId', 'state'])
@Check('ck_outbox_state', "state IN ('waiting','sent','dead','dropped')")
@Check('ck_outbox_way', "way IN ('browser-push','phone-push','e-mail')")
export class OutboxEntry {
  @PrimaryColumn(idColumn('id'))
  id!: string;

  @ForeignKey(() => Workshop, { name: 'fk_outbox_entry_workshop' })
  @Column(idColumn('workshop_id'))
  workshopId!: string;

  @ForeignKey(() => Alert, { name: 'fk_outbox_entry_alert', onDelete: 'CASCADE' })
  @Column(idColumn('alert_id'))
  alertId!: string;

  @Column(wholeColumn('turn'))
  turn!: number;

  @ForeignKey(() => Person, { name: 'fk_outbox_entry_person' })
  @Column(idColumn('person_id'))
  personId!: string;

  @Column(textColumn('way'))
  way!: SentWay;

  @Column(textColumn('state'))
  state!: 'waiting' | 'sent' | 'dead' | 'dropped';

  @Column(instantColumn('due_at'))
  dueAt!: number;

  /** Who works on it does so until then; a process that died gives it back by that. */
  @Column(optionalInstantColumn('leased_until'))
  leasedUntil!: number | null;

  @Column(wholeColumn('tries'))
  tries!: number;

  /** Devices it has reached: a further try leaves them alone. */
  @Column(jsonColumn('reached'))
  reached!: string[];

  @Column(jsonColumn('tickets'))
  tickets!: PushTicket[];

  /** When the receipts of its tickets are asked for; null: none are open. */
  @Column(optionalInstantColumn('receipt_due_at'))
  receiptDueAt!: number | null;

  /** It was put off for the quiet hours of its person at this instant. */
  @Column(optionalInstantColumn('held_at'))
  heldAt!: number | null;

  /** Why it was not sent, or why the last try failed. */
  @Column(optionalTextColumn('reason'))
  reason!: string | null;

  @Column(instantColumn('created_at'))
  createdAt!: number;

  /** When it was sent, given up or dropped. */
  @Column(optionalInstantColumn('ended_at'))
  endedAt!: number | null;
}
