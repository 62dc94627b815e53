import type { PersonRole } from '@/lib/people/list-people';
import { countOf, formatDate } from '../ui/format';
import { Gauge, type GaugeState } from '../ui/gauge';
import { PlainTable } from '../ui/plain-table';

const standings: Record<PersonRole['standing'], { state: GaugeState; word: string }> = {
  'in force': { state: 'done', word: 'In force' },
  'to come': { state: 'empty', word: 'To come' },
  ended: { state: 'closed', word: 'Ended' },
};

function standing({ accountState, standing: period }: PersonRole): { state: GaugeState; word: string } {
  if (accountState === 'closed') return { state: 'closed', word: 'Account closed' };
  return accountState === 'invited' ? { state: 'waiting', word: 'Invited, not joined' } : standings[period];
}

/** Accounts by code, with role, place and period. */
export function PeopleTable({ people }: { people: readonly PersonRole[] }) {
  return (
    <PlainTable
      caption="People"
      rows={people}
      getRowId={({ id }) => id}
      columns={[
        { id: 'label', header: 'Code', cell: ({ label }) => <b className="t-num">{label}</b> },
        { id: 'role', header: 'Role', cell: ({ role }) => role },
        { id: 'where', header: 'Where', cell: ({ where }) => where },
        { id: 'period', header: 'Period', cell: ({ startsAt, endsAt }) => (endsAt ? `${formatDate(new Date(startsAt))} to ${formatDate(new Date(endsAt))}` : `since ${formatDate(new Date(startsAt))}`) },
        { id: 'roles', header: 'Roles of the account', cell: ({ roles }) => <span className="text-ink-2">{countOf(roles, 'role')}</span> },
        { id: 'state', header: 'State', cell: (person) => <Gauge {...standing(person)} /> },
      ]}
    />
  );
}
