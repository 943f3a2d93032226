import { Column, Entity, JoinColumn, ManyToOne, PrimaryColumn, type Relation } from 'typeorm';
import { Person } from '../people/person.entity';
import { Capture } from './capture.entity';

/** An Idempotency-Key that a person's upload came with, so that sending it again makes no second capture. */
@Entity('upload_key')
export class UploadKey {
  @PrimaryColumn({ name: 'person_id', type: 'uuid', primaryKeyConstraintName: 'pk_upload_key' })
  personId!: string;

  @PrimaryColumn({ name: 'key', type: 'text', primaryKeyConstraintName: 'pk_upload_key' })
  key!: string;

  /** Hash of the file's bytes, its name and the form's fields. */
  @Column({ name: 'fingerprint', type: 'text' })
  fingerprint!: string;

  @Column({ name: 'capture_id', type: 'uuid' })
  captureId!: string;

  @Column({ name: 'created_at', type: 'timestamptz', precision: 3, default: () => 'now()' })
  readonly createdAt!: Date;

  @ManyToOne(() => Person)
  @JoinColumn({ name: 'person_id', foreignKeyConstraintName: 'fk_upload_key_person' })
  person?: Relation<Person>;

  @ManyToOne(() => Capture)
  @JoinColumn({ name: 'capture_id', foreignKeyConstraintName: 'fk_upload_key_capture' })
  capture?: Relation<Capture>;
}
