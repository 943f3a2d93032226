import { Column, Entity, Index, JoinColumn, ManyToOne, PrimaryColumn, type Relation } from 'typeorm';
import { StoredObject } from '../storage/stored-object.entity';
import { BenchRecordRow } from './record.entity';

/** Where a record's curve lies in the object store: little-endian Float64, all x, then all y. Segment 0 is the record itself. */
@Entity('record_trace')
@Index('ix_record_trace_sha256', ['sha256'])
export class RecordTrace {
  @PrimaryColumn({ name: 'record_id', type: 'uuid', primaryKeyConstraintName: 'pk_record_trace' })
  recordId!: string;

  @PrimaryColumn({ name: 'segment', type: 'integer', primaryKeyConstraintName: 'pk_record_trace' })
  segment!: number;

  @PrimaryColumn({ name: 'channel', type: 'text', primaryKeyConstraintName: 'pk_record_trace' })
  channel!: string;

  @PrimaryColumn({ name: 'name', type: 'text', primaryKeyConstraintName: 'pk_record_trace' })
  name!: string;

  @Column({ name: 'sha256', type: 'text' })
  sha256!: string;

  @Column({ name: 'points', type: 'integer' })
  points!: number;

  @Column({ name: 'x_unit', type: 'text' })
  xUnit!: string;

  @Column({ name: 'y_unit', type: 'text' })
  yUnit!: string;

  @ManyToOne(() => BenchRecordRow)
  @JoinColumn({ name: 'record_id', foreignKeyConstraintName: 'fk_record_trace_record' })
  record?: Relation<BenchRecordRow>;

  @ManyToOne(() => StoredObject)
  @JoinColumn({ name: 'sha256', foreignKeyConstraintName: 'fk_record_trace_object' })
  object?: Relation<StoredObject>;
}
