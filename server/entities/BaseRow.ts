import { CreateDateColumn, PrimaryGeneratedColumn } from 'typeorm';

/** Every table has a random id and its time of creation. */
export abstract class BaseRow {
  @PrimaryGeneratedColumn('uuid')
  id!: string;

  @CreateDateColumn({ type: 'timestamptz' })
  createdAt!: Date;
}
