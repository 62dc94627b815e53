import { addDays, type LocalDate } from '@/instruments/calendar';
import { consentForm } from './consent-form';
import { Draw } from './draw';
import { type DemoEvent, eventBy, inserted, type Row } from './events';
import { type Life, live } from './participant-life';
import { inventPerson, personKey } from './person';
import { type DemoSite, type Plan, secondRoles, type Staff, system } from './plan';
import { otherScreening } from './screenings';
import { castOf, enrolmentAges } from './story';

/** The study, its sites, its protocol and the people who work in it. Passwords stay plain here; the loader hashes them. */
export function studyEvents(plan: Plan): DemoEvent[] {
  const at = plan.clock.at(plan.startsOn, 540, 'Europe/London');
  const draw = Draw.of(plan.seed, 1, 'ids');
  const siteIds = (codes: readonly string[]): string[] => plan.sites.filter(({ code }) => codes.includes(code)).map(({ id }) => id);
  const grant = (account: Staff, role: string, label: string, codes: readonly string[]): Row => ({
    id: draw.uuid(), account_id: account.accountId, study_id: plan.ids.study, role, label, whole_study: codes.length === 0, site_ids: siteIds(codes), starts_at: at.toISOString(),
  });
  const second = secondRoles.flatMap(({ label, role, grantLabel, siteCodes }) => plan.staff.filter((one) => one.label === label).map((one) => grant(one, role, grantLabel, siteCodes)));
  return [
    eventBy(system, at, 'demo.seed', [
      inserted('study', { id: plan.ids.study, name: 'Steady Lift', starts_on: plan.startsOn, ends_on: plan.endsOn, recruitment_target: plan.sites.reduce((sum, { target }) => sum + target, 0) }),
      inserted('site', ...plan.sites.map((site) => siteRow(plan, site))),
      inserted('account', ...plan.staff.map(({ accountId, label, name }) => ({ id: accountId, kind: 'staff', label, name, state: 'active', created_at: at.toISOString() }))),
      inserted('credential', ...plan.staff.map(({ accountId, email, password }) => ({ account_id: accountId, email, password_hash: password && `demo:${password}`, changed_at: at.toISOString() }))),
      inserted('role_grant', ...plan.staff.map((one) => grant(one, one.role, one.label, one.siteCodes)), ...second),
      inserted('protocol_version', { id: plan.ids.protocol, study_id: plan.ids.study, number: '1.0', document: plan.protocol, reason: 'First version', effective_on: plan.startsOn }),
      inserted('consent_form_version', { id: plan.ids.consentForm, study_id: plan.ids.study, number: '1.0', document: consentForm, effective_on: plan.startsOn }),
    ]),
  ];
}

const siteRow = (plan: Plan, { id, code, name, timeZone, phone, email, target, participants, others }: DemoSite): Row => ({
  id, study_id: plan.ids.study, code, name, time_zone: timeZone, phone, email, recruitment_target: target, participant_count: participants, screening_count: participants + others,
});

interface Arrival { readonly on: LocalDate; readonly number: number | null; readonly nth: number }

/** Everybody a site screened, in order of day, so that screening numbers run with the calendar. */
function arrivalsOf(plan: Plan, site: DemoSite): Arrival[] {
  const today = plan.clock.today(site.timeZone);
  const ages = enrolmentAges(site.participants, castOf(site), (number) => Draw.of(plan.seed, personKey(site, number), 'names').uniform(0, 0.9));
  const enrolled = ages.map((age, index) => ({ on: addDays(today, -Math.max(1, age)), number: index + 1, nth: 0 }));
  const draw = Draw.of(plan.seed, 2 + site.index, 'screening');
  const recent = [9, 6, 1];
  const others = Array.from({ length: site.others }, (_, nth) => {
    const left = site.others - 1 - nth;
    return { on: addDays(today, -(left < 3 ? (recent[2 - left] ?? 1) : draw.whole(20, 755))), number: null, nth: nth + 1 };
  });
  return [...enrolled, ...others].toSorted((a, b) => a.on.localeCompare(b.on));
}

/** The people of the study one by one: participants as lives, the others as events only. */
export function* people(plan: Plan): Generator<{ readonly life: Life | null; readonly events: readonly DemoEvent[] }> {
  for (const site of plan.sites) {
    const cast = castOf(site);
    for (const [index, { on, number, nth }] of arrivalsOf(plan, site).entries()) {
      if (number === null) {
        yield { life: null, events: otherScreening(plan, site, nth, index + 1, on) };
        continue;
      }
      const life = live(plan, inventPerson(plan, { site, number, enrolledOn: on, cast: cast.get(number) ?? null }), index + 1);
      yield { life, events: life.events };
    }
  }
}
