import { Check, Column, Entity, ForeignKey, Index, PrimaryColumn, Unique } from 'typeorm';
import { idColumn, instantColumn, optionalTextColumn, textColumn } from './columns';
import { Person } from './person';
import { Session } from './session';
import { Workshop } from './workshop';

/** Where pushes of a person go: a browser's subscription or a phone's token. It ends with the session that added it. */
@Entity({ name: 'push_device' })
@Unique('uq_push_device_address', ['address'])
@Index('ix_push_device_person', ['workshopId', 'personId'])
@Check('ck_push_device_kind', "kind IN ('browser','phone')")
export class PushDevice {
  @PrimaryColumn(idColumn('id'))
  id!: string;

  @ForeignKey(() => Workshop, { name: 'fk_push_device_workshop' })
  @Column(idColumn('workshop_id'))
  workshopId!: string;

  @ForeignKey(() => Person, { name: 'fk_push_device_person', onDelete: 'CASCADE' })
  @Column(idColumn('person_id'))
  personId!: string;

  @ForeignKey(() => Session, { name: 'fk_push_device_session', onDelete: 'CASCADE' })
  @Column(idColumn('session_id'))
  sessionId!: string;

  @Column(textColumn('kind'))
  kind!: 'browser' | 'phone';

  /** Address at the push service, or the phone's token. */
  @Column(textColumn('address'))
  address!: string;

  /** Keys of a browser's subscription; null on a phone. */
  @Column(optionalTextColumn('p256dh'))
  p256dh!: string | null;

  @Column(optionalTextColumn('auth'))
  auth!: string | null;

  @Column(textColumn('name'))
  name!: string;

  @Column(instantColumn('created_at'))
  createdAt!: number;
}
