import 'reflect-metadata/lite';
import {
  ArrayMaxSize,
  ArrayMinSize,
  IsArray,
  IsBoolean,
  IsEmail,
  IsIn,
  IsOptional,
  IsString,
  Length,
  MaxLength,
} from 'class-validator';

import { ROLES, type Role } from './roles.js';

export class SignInRequest {
  @IsString({ message: 'E-mail is missing.' })
  @MaxLength(254, { message: 'That e-mail is too long.' })
  email!: string;
  @IsString({ message: 'Password is missing.' })
  @MaxLength(1000, { message: 'That password is too long.' })
  password!: string;
}

export class ChangePasswordRequest {
  @IsString({ message: 'Your password now is missing.' })
  @MaxLength(1000, { message: 'That is too long.' })
  current!: string;
  @IsString({ message: 'The new password is missing.' })
  @MaxLength(1000, { message: 'That is too long.' })
  password!: string;
}

export class FirstOwnerRequest {
  @IsString() @Length(1, 200, { message: 'The house needs a name.' }) house!: string;
  @IsString() @MaxLength(200) town!: string;
  @IsString()
  @Length(1, 64, { message: 'The house needs a time zone, such as Europe/Brussels.' })
  zone!: string;
  @IsString()
  @Length(3, 3, { message: 'A currency has three letters, such as USD.' })
  baseCurrency!: string;
  @IsIn([1, 10], { message: 'The balance reads to 0.01 ct or to 0.001 ct.' }) step!: 1 | 10;
  @IsString() @Length(1, 200, { message: 'Your name is missing.' }) name!: string;
  @IsEmail({}, { message: 'That is not an e-mail address.' }) email!: string;
  @IsString() @MaxLength(1000) password!: string;
}

export class AddPersonRequest {
  @IsString() @Length(1, 200, { message: 'The name is missing.' }) name!: string;
  @IsEmail({}, { message: 'That is not an e-mail address.' }) email!: string;
  @IsArray()
  @ArrayMinSize(1, { message: 'Choose at least one role.' })
  @ArrayMaxSize(5)
  @IsIn(ROLES, { each: true, message: 'A role is owner, dealer, buyer, bookkeeper or retailer.' })
  roles!: Role[];
  @IsString() @MaxLength(1000) password!: string;
  @IsOptional() @IsString() @MaxLength(20) party?: string;
}

export class ChangePersonRequest {
  @IsOptional()
  @IsArray()
  @ArrayMinSize(1, { message: 'Choose at least one role.' })
  @ArrayMaxSize(5)
  @IsIn(ROLES, { each: true, message: 'A role is owner, dealer, buyer, bookkeeper or retailer.' })
  roles?: Role[];
  @IsOptional() @IsBoolean() seesCost?: boolean;
  @IsOptional() @IsBoolean() isActive?: boolean;
}

/** Who is signed in, what he may, and what every page needs. */
export interface Me {
  id: string;
  name: string;
  roles: Role[];
  seesCost: boolean;
  mustChangePassword: boolean;
  csrf: string;
  house: HouseInBrief;
}

export interface HouseInBrief {
  name: string;
  town: string;
  isDemo: boolean;
  zone: string;
  step: 1 | 10;
  baseCurrency: string;
  priceCurrency: string;
  today: string;
  differencesOpen: number;
}

export interface PersonRow {
  id: string;
  name: string;
  email: string;
  roles: Role[];
  seesCost: boolean;
  isActive: boolean;
  lastHereAt: string | null;
  version: number;
}
