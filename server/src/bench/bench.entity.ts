import { Check, Column, Entity, PrimaryColumn } from 'typeorm';

/** The one row that says whose server this is. */
@Entity('bench')
@Check('ck_bench_single', 'id = 1')
export class Bench {
  @PrimaryColumn({ name: 'id', type: 'smallint', default: 1, primaryKeyConstraintName: 'pk_bench' })
  readonly id!: number;

  @Column({ name: 'name', type: 'text' })
  name!: string;

  /** Set from the first start until the first administrator exists. */
  @Column({ name: 'setup_secret_hash', type: 'text', nullable: true })
  setupSecretHash!: string | null;
}
