import { Column, Entity, PrimaryGeneratedColumn } from 'typeorm';

/** Whom we deal with; one party may be several things to us. Limits in minor units of its currency. */
@Entity('party')
export class Party {
  @PrimaryGeneratedColumn('identity', { type: 'bigint', generatedIdentity: 'ALWAYS' }) id!: string;
  @Column({ type: 'bigint' }) number!: string;
  @Column({ type: 'text' }) name!: string;
  @Column({ type: 'boolean', name: 'is_customer' }) isCustomer!: boolean;
  @Column({ type: 'boolean', name: 'is_supplier' }) isSupplier!: boolean;
  @Column({ type: 'boolean', name: 'is_consignor' }) isConsignor!: boolean;
  @Column({ type: 'boolean', name: 'is_broker' }) isBroker!: boolean;
  @Column({ type: 'boolean', name: 'is_laboratory' }) isLaboratory!: boolean;
  @Column({ type: 'boolean', name: 'is_workshop' }) isWorkshop!: boolean;
  @Column({ type: 'text' }) town!: string;
  @Column({ type: 'text' }) country!: string;
  @Column({ type: 'text' }) address!: string;
  @Column({ type: 'text' }) email!: string;
  @Column({ type: 'text' }) phone!: string;
  @Column({ type: 'text' }) contact!: string;
  @Column({ type: 'text', name: 'tax_number' }) taxNumber!: string;
  @Column({ type: 'text' }) currency!: string;
  @Column({ type: 'integer', name: 'memo_days' }) memoDays!: number;
  @Column({ type: 'integer', name: 'payment_days' }) paymentDays!: number;
  @Column({ type: 'text' }) terms!: string;
  @Column({ type: 'bigint', name: 'credit_limit', nullable: true }) creditLimit!: string | null;
  @Column({ type: 'bigint', name: 'memo_limit', nullable: true }) memoLimit!: string | null;
  @Column({ type: 'date', name: 'identity_papers_until', nullable: true }) identityPapersUntil!:
    | string
    | null;
  @Column({ type: 'date', name: 'resale_certificate_until', nullable: true })
  resaleCertificateUntil!: string | null;
  @Column({ type: 'date', name: 'sanctions_checked_on', nullable: true }) sanctionsCheckedOn!:
    | string
    | null;
  @Column({ type: 'boolean', name: 'is_muted' }) isMuted!: boolean;
  @Column({ type: 'text' }) note!: string;
  @Column({ type: 'integer', default: 1 }) version!: number;
}
