import type { ConsentView } from '@/lib/consent/view-consent';
import { formatMoment } from '../ui/format';

export interface AgreedProps {
  consent: Pick<ConsentView, 'formNumber' | 'form' | 'permissions' | 'participantSignedAt' | 'staffSignedAt' | 'signatures' | 'site'>;
}

/** What was agreed and chosen, in the form's own words. */
export function Agreed({ consent }: AgreedProps) {
  const { form, permissions, signatures, site } = consent;
  const by = (who: 'participant' | 'staff', moment: Date | null) => {
    const name = signatures.find((signature) => signature.who === who)?.name;
    return moment ? `${name ? `${name}, ` : ''}${formatMoment(moment, site.timeZone)}` : 'not yet';
  };
  return (
    <div className="grid gap-4">
      <dl className="grid gap-2">
        <Line term="Form" value={`${form.title}, version ${consent.formNumber}`} />
        <Line term="Signed by the participant" value={by('participant', consent.participantSignedAt)} />
        <Line term={`Signed by ${site.name}`} value={by('staff', consent.staffSignedAt)} />
      </dl>
      <ul>
        {form.statements.map(({ key, text }) => (
          <li key={key} className="border-t border-rule py-2">
            {text}
          </li>
        ))}
      </ul>
      {form.permissions.length > 0 ? (
        <dl>
          {form.permissions.map(({ key, text }) => (
            <div key={key} className="flex justify-between gap-6 border-t border-rule py-2">
              <dt>{text}</dt>
              <dd className="font-semibold">{permissions[key] === 'yes' ? 'Yes' : permissions[key] === 'no' ? 'No' : 'Not answered'}</dd>
            </div>
          ))}
        </dl>
      ) : null}
    </div>
  );
}

function Line({ term, value }: { term: string; value: string }) {
  return (
    <div>
      <dt className="text-ink-2">{term}</dt>
      <dd>{value}</dd>
    </div>
  );
}
