import type { Role } from '@foldwell/contracts';
import { Column, Entity, PrimaryGeneratedColumn } from 'typeorm';

/** Somebody of the house, or from outside with a party. */
@Entity('person')
export class Person {
  @PrimaryGeneratedColumn('identity', { type: 'bigint', generatedIdentity: 'ALWAYS' }) id!: string;
  @Column({ type: 'text' }) email!: string;
  @Column({ type: 'text' }) name!: string;
  @Column({ type: 'text', name: 'password_hash', nullable: true }) passwordHash!: string | null;
  @Column({ type: 'boolean', name: 'must_change_password', default: false })
  mustChangePassword!: boolean;
  @Column({ type: 'text', array: true }) roles!: Role[];
  @Column({ type: 'boolean', name: 'sees_cost', default: false }) seesCost!: boolean;
  @Column({ type: 'bigint', name: 'party_id', nullable: true }) partyId!: string | null;
  @Column({ type: 'timestamptz', name: 'disabled_at', nullable: true }) disabledAt!: Date | null;
  @Column({ type: 'timestamptz', name: 'last_here_at', nullable: true }) lastHereAt!: Date | null;
  @Column({ type: 'integer', default: 1 }) version!: number;
}

/** Cost is for the owner, the buyer, the bookkeeper, and whom the owner lets see it. */
export function maySeeCost(person: Pick<Person, 'roles' | 'seesCost'>): boolean {
  return (
    person.seesCost || person.roles.some((role) => ['owner', 'buyer', 'bookkeeper'].includes(role))
  );
}
