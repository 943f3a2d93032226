import { Column, Entity, JoinColumn, OneToOne, PrimaryColumn, type Relation } from 'typeorm';
import { StoredObject } from '../storage/stored-object.entity';

/** The wave's outline: least and greatest sample of each run of frames. */
export interface Overview {
  readonly framesPerBin: number;
  readonly channels: readonly { readonly min: readonly number[]; readonly max: readonly number[] }[];
}

@Entity('capture_overview')
export class CaptureOverview {
  @PrimaryColumn({ name: 'sha256', type: 'text', primaryKeyConstraintName: 'pk_capture_overview' })
  sha256!: string;

  @OneToOne(() => StoredObject)
  @JoinColumn({ name: 'sha256', foreignKeyConstraintName: 'fk_capture_overview_object' })
  object?: Relation<StoredObject>;

  @Column({ name: 'content', type: 'json' })
  content!: Overview;
}
