import { Check, Column, Entity, Index, PrimaryColumn } from 'typeorm';

export const EVIDENCE_STATES = ['sound', 'damaged', 'missing'] as const;
export type Evidence = (typeof EVIDENCE_STATES)[number];

/** bigint reaches JavaScript as a string; sizes stay far below 2^53. */
export const bigintAsNumber = { from: (value: string) => Number(value), to: (value: number) => value };

/** Bytes in the object store that something refers to: a capture's file or a record's trace. */
@Entity('stored_object')
@Index('ix_stored_object_checked_at', ['checkedAt', 'sha256'])
@Index('ix_stored_object_unsound', ['evidence'], { where: `evidence <> 'sound'` })
@Check('ck_stored_object_evidence', `evidence IN ('sound', 'damaged', 'missing')`)
@Check('ck_stored_object_kind', `kind IN ('capture', 'trace')`)
export class StoredObject {
  /** Hex SHA-256 of the bytes. */
  @PrimaryColumn({ name: 'sha256', type: 'text', primaryKeyConstraintName: 'pk_stored_object' })
  sha256!: string;

  @Column({ name: 'size_bytes', type: 'bigint', transformer: bigintAsNumber })
  sizeBytes!: number;

  @Column({ name: 'kind', type: 'text' })
  kind!: 'capture' | 'trace';

  @Column({ name: 'stored_at', type: 'timestamptz', default: () => 'now()' })
  readonly storedAt!: Date;

  /** What the last check of the bytes against their hash said. */
  @Column({ name: 'evidence', type: 'text', default: 'sound' })
  evidence!: Evidence;

  @Column({ name: 'checked_at', type: 'timestamptz', nullable: true })
  checkedAt!: Date | null;
}
