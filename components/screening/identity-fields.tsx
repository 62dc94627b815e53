import type { FieldErrors, UseFormRegister } from 'react-hook-form';
import { DateField } from '../ui/date-field';
import { TextField } from '../ui/text-field';

/** Name and contact as they are typed. */
export interface IdentityTyped {
  name: string;
  email: string;
  phone: string;
  bornOn: string;
}

/** Fields of name and contact, shared by opening a screening and correcting it. */
export function IdentityFields({ register, errors, today }: { register: UseFormRegister<IdentityTyped>; errors: FieldErrors<IdentityTyped>; today: string }) {
  return (
    <>
      <TextField id="name" label="Name" autoComplete="off" error={errors.name?.message} {...register('name')} />
      <TextField id="email" type="email" label="E-mail" hint="For the consent link, the copy and the invitation" optional autoComplete="off" error={errors.email?.message} {...register('email')} />
      <TextField id="phone" type="tel" label="Phone" optional autoComplete="off" error={errors.phone?.message} {...register('phone')} />
      <DateField id="bornOn" label="Date of birth" hint="Needed before enrolment" optional max={today} error={errors.bornOn?.message} {...register('bornOn')} />
    </>
  );
}
