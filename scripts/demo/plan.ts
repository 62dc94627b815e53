import { addDays, type LocalDate } from '@/instruments/calendar';
import { inviteeAccountId, systemAccountId } from '@/lib/auth/roles';
import { demoAccounts } from '../demo-accounts.mjs';
import { DemoClock } from './clock';
import { Draw } from './draw';
import type { Doer } from './events';
import { protocolDocument } from './protocol';

/** Somebody of a site's team, or of the study. */
export interface Staff extends Doer {
  readonly siteCodes: readonly string[];
  readonly email: string;
  readonly name: string;
  readonly password: string | null;
}

export interface DemoSite {
  readonly index: number;
  readonly id: string;
  readonly code: string;
  readonly name: string;
  readonly timeZone: string;
  readonly phone: string;
  readonly email: string;
  readonly target: number;
  /** Participants, and people screened without being enrolled or not yet. */
  readonly participants: number;
  readonly others: number;
  readonly coordinator: Staff;
  readonly assessor: Staff;
  readonly investigator: Staff;
  /** Share of readings this site's assessor rounds to the next half centimetre. */
  readonly roundedShare: number;
  /** Mean days until a query is answered. */
  readonly answerDays: number;
}

/** All that the generator knows before the first person. */
export interface Plan {
  readonly seed: number;
  readonly clock: DemoClock;
  readonly protocol: typeof protocolDocument;
  readonly ids: { readonly study: string; readonly protocol: string; readonly consentForm: string };
  readonly startsOn: LocalDate;
  readonly endsOn: LocalDate;
  readonly sites: readonly DemoSite[];
  readonly staff: readonly Staff[];
  readonly monitor: Staff;
  readonly dataManager: Staff;
  /** Training is written down for this many weeks at most. */
  readonly logWeeks: number;
  /** Whether the monitor marks every girth of the sittings checked in full. */
  readonly marksTape: boolean;
}

export const system: Doer = { accountId: systemAccountId, role: 'system', label: 'Tidemark' };
export const invitee: Doer = { accountId: inviteeAccountId, role: 'invitee', label: 'Invited person' };

interface Person { readonly role: string; readonly label: string; readonly siteCodes: readonly string[]; readonly demoKey?: string; readonly name?: string }

/** Everybody who works in the study. A demo key names the sign-in that belongs to the person. */
const people: readonly Person[] = [
  { role: 'site-coordinator', label: 'C-03', siteCodes: ['NM'], demoKey: 'coordinator' },
  { role: 'assessor', label: 'T-02', siteCodes: ['NM'], demoKey: 'assessor' },
  { role: 'site-investigator', label: 'R-01', siteCodes: ['NM'], demoKey: 'site-investigator' },
  { role: 'site-coordinator', label: 'C-05', siteCodes: ['SM'], demoKey: 'coordinator-saltmarsh' },
  { role: 'assessor', label: 'T-04', siteCodes: ['SM'], name: 'Bryony Sedge' },
  { role: 'site-investigator', label: 'R-02', siteCodes: ['SM'], name: 'Dr Alaric Pell' },
  { role: 'site-coordinator', label: 'C-08', siteCodes: ['KB'], name: 'Juno Harrow' },
  { role: 'assessor', label: 'T-06', siteCodes: ['KB'], name: 'Wilf Tarrant' },
  { role: 'site-investigator', label: 'R-03', siteCodes: ['KB'], name: 'Dr Sable Orme' },
  { role: 'monitor', label: 'M-01', siteCodes: [], demoKey: 'monitor' },
  { role: 'investigator', label: 'R-10', siteCodes: [], demoKey: 'investigator' },
  { role: 'data-manager', label: 'D-01', siteCodes: [], demoKey: 'data-manager' },
  { role: 'administrator', label: 'S-01', siteCodes: [], demoKey: 'administrator' },
  { role: 'auditor', label: 'V-01', siteCodes: [], demoKey: 'auditor' },
];

/** Roles people hold besides their first: one person, two hats, two sites. */
export const secondRoles = [{ label: 'C-05', role: 'assessor', grantLabel: 'T-05', siteCodes: ['SM', 'KB'] }] as const;

function staffOf(draw: Draw): Staff[] {
  return people.map(({ role, label, siteCodes, demoKey, name }) => {
    const account = demoAccounts.find(({ key }) => key === demoKey);
    if (demoKey && !account) throw new Error(`scripts/demo-accounts.mjs has no account ${demoKey}.`);
    return {
      accountId: draw.uuid(),
      role,
      label,
      siteCodes,
      name: account?.name ?? name ?? label,
      email: account?.email ?? `${label.toLowerCase()}@tidemark.example`,
      password: account?.password ?? null,
    };
  });
}

const places = [
  { code: 'NM', name: 'Northmoor', timeZone: 'Europe/London', phone: '01632 960142', share: 0.39, target: 80, roundedShare: 0, answerDays: 5 },
  { code: 'SM', name: 'Saltmarsh', timeZone: 'Europe/London', phone: '01632 960377', share: 0.33, target: 70, roundedShare: 0.45, answerDays: 8 },
  { code: 'KB', name: 'Kestrel Bay', timeZone: 'Australia/Hobart', phone: '(03) 5550 0164', share: 0.28, target: 60, roundedShare: 0, answerDays: 13 },
] as const;

/** Lays out the study for a number of participants, as of one moment. */
export function layOut({ seed, now, participants, logWeeks, marksTape = true }: { seed: number; now: Date; participants: number; logWeeks: number; marksTape?: boolean }): Plan {
  const clock = new DemoClock(now);
  const draw = Draw.of(seed, 0, 'ids');
  const ids = { study: draw.uuid(), protocol: draw.uuid(), consentForm: draw.uuid() };
  const staff = staffOf(draw);
  const member = (role: string, code: string): Staff => staff.find((one) => one.role === role && one.siteCodes.includes(code)) as Staff;
  const small = Math.floor(participants * places[2].share);
  const middle = Math.floor(participants * places[1].share);
  const counts = [participants - small - middle, middle, small];
  const sites = places.map(({ share: _share, target, ...place }, index): DemoSite => ({
    ...place,
    index,
    id: draw.uuid(),
    email: `${place.name.toLowerCase().replace(' ', '-')}@steady-lift.example`,
    target: Math.max(target, Math.ceil(((counts[index] ?? 0) * 4) / 3)),
    participants: counts[index] ?? 0,
    others: Math.ceil((counts[index] ?? 0) * 0.28) + 3,
    coordinator: member('site-coordinator', place.code),
    assessor: member('assessor', place.code),
    investigator: member('site-investigator', place.code),
  }));
  const today = clock.today('Europe/London');
  return {
    seed, clock, protocol: protocolDocument, ids, sites, staff, logWeeks, marksTape,
    startsOn: addDays(today, -775),
    endsOn: addDays(today, 686),
    monitor: staff.find(({ role }) => role === 'monitor') as Staff,
    dataManager: staff.find(({ role }) => role === 'data-manager') as Staff,
  };
}
