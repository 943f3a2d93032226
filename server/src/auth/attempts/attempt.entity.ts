import { Column, Entity, PrimaryColumn } from 'typeorm';

/** How often something was tried in vain, by a key that names what and by whom. */
@Entity('attempt')
export class Attempt {
  @PrimaryColumn({ name: 'key', type: 'text', primaryKeyConstraintName: 'pk_attempt' })
  key!: string;

  @Column({ name: 'count', type: 'integer' })
  count!: number;

  @Column({ name: 'updated_at', type: 'timestamptz' })
  updatedAt!: Date;

  @Column({ name: 'blocked_until', type: 'timestamptz', nullable: true })
  blockedUntil!: Date | null;
}
