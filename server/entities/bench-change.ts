import { Column, Entity, ForeignKey, Index, PrimaryColumn } from 'typeorm';
import { idColumn, instantColumn, jsonColumn, optionalInstantColumn, textColumn } from './columns';
import type { MovedCharge } from './bench-change-json';
import { Person } from './person';
import { Workshop } from './workshop';

/** One change of the bench plan, by hand or by a proposal: what its charges were before, so that it can be undone. */
@Entity({ name: 'bench_change' })
@Index('ix_bench_change_at', ['workshopId', 'at'])
export class BenchChange {
  @PrimaryColumn(idColumn('id'))
  id!: string;

  @ForeignKey(() => Workshop, { name: 'fk_bench_change_workshop' })
  @Column(idColumn('workshop_id'))
  workshopId!: string;

  @ForeignKey(() => Person, { name: 'fk_bench_change_person' })
  @Column(idColumn('person_id'))
  personId!: string;

  @Column(textColumn('text'))
  text!: string;

  @Column(jsonColumn('moved'))
  moved!: MovedCharge[];

  @Column(instantColumn('at'))
  at!: number;

  @Column(optionalInstantColumn('undone_at'))
  undoneAt!: number | null;
}
