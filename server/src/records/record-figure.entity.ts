import { Column, Entity, Index, JoinColumn, ManyToOne, PrimaryColumn, type Relation } from 'typeorm';
import { BenchRecordRow } from './record.entity';

/** One figure of a record as a row, for search and comparison. Segment 0 is the record itself. */
@Entity('record_figure')
@Index('ix_record_figure_key_value', ['key', 'value'])
export class RecordFigure {
  @PrimaryColumn({ name: 'record_id', type: 'uuid', primaryKeyConstraintName: 'pk_record_figure' })
  recordId!: string;

  @PrimaryColumn({ name: 'segment', type: 'integer', primaryKeyConstraintName: 'pk_record_figure' })
  segment!: number;

  @PrimaryColumn({ name: 'channel', type: 'text', primaryKeyConstraintName: 'pk_record_figure' })
  channel!: string;

  @PrimaryColumn({ name: 'key', type: 'text', primaryKeyConstraintName: 'pk_record_figure' })
  key!: string;

  @Column({ name: 'value', type: 'double precision', nullable: true })
  value!: number | null;

  /** The value of a figure that is a word, such as a polarity. */
  @Column({ name: 'word', type: 'text', nullable: true })
  word!: string | null;

  @Column({ name: 'limit_by', type: 'text', nullable: true })
  limitBy!: string | null;

  @Column({ name: 'margin_db', type: 'double precision', nullable: true })
  marginDb!: number | null;

  @Column({ name: 'expanded_uncertainty', type: 'double precision', nullable: true })
  expandedUncertainty!: number | null;

  @ManyToOne(() => BenchRecordRow)
  @JoinColumn({ name: 'record_id', foreignKeyConstraintName: 'fk_record_figure_record' })
  record?: Relation<BenchRecordRow>;
}
