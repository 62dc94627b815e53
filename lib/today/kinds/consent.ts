import { moment } from '@/lib/work/time';
import { defineWorkKind, type WorkCommon } from '../work-kind';

export interface ConsentWork extends WorkCommon {
  readonly kind: 'consent';
  readonly screeningId: string;
  readonly signedAt: string;
  readonly mode: string;
}

type Row = Pick<ConsentWork, 'id' | 'screeningId' | 'signedAt' | 'mode'>;

/** Consents the participant has signed and nobody has countersigned. They have no deadline, so they stand under today. */
export const consentWork = defineWorkKind<ConsentWork, Row>({
  kind: 'consent',
  // lpad would cut a number of five digits.
  keys: `select c.id, c.site_id, s.code || '-S' || lpad(k.number::text, greatest(4, length(k.number::text)), '0') as code, s.today as due_on, null::timestamptz as at, 0 as tie, null as standing
    from consent c join screening k on k.id = c.screening_id join site_day s on s.id = c.site_id where c.state = 'signed by participant'`,
  details: `select c.id, c.screening_id as "screeningId", c.participant_signed_at::text as "signedAt", c.mode from asked join consent c on c.id = asked.id`,
  item: ({ signedAt, ...row }, common) => ({ ...common, ...row, kind: 'consent', signedAt: moment(signedAt).toISOString() }),
});
