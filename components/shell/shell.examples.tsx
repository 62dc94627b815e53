import { PhoneShell } from './phone-shell';
import { StaffShell } from './staff-shell';

const staffNav = [
  { href: '/shell-example', label: 'Today', current: true },
  { href: '/shell-example/participants', label: 'Participants' },
  { href: '/shell-example/margin', label: 'Margin', count: 4 },
  { href: '/shell-example/safety', label: 'Safety', count: 1 },
  { href: '/shell-example/verification', label: 'Verification' },
  { href: '/shell-example/results', label: 'Results' },
  { href: '/shell-example/extracts', label: 'Extracts' },
];

/** The staff frame round an empty page. */
export function StaffShellExample() {
  return (
    <StaffShell
      homeHref="/gallery"
      study="Steady Lift"
      site={
        <select aria-label="Site" defaultValue="nm">
          <option value="nm">Northmoor</option>
          <option value="sm">Saltmarsh</option>
        </select>
      }
      nav={staffNav}
      findHref="/gallery"
      role="Site coordinator"
      code="C-03"
      studyMonth={{ gone: 22, of: 48 }}
      footer={[
        'Wed 3 Mar 2027, 10:40',
        'Protocol 2.1',
        'Sealed and checked to entry 48 039 at 06:00',
        'All times are Northmoor local time',
      ]}
    >
      <h1>Wednesday 3 March</h1>
      <p className="t-lede mt-1.5">Northmoor. One report to look at first, three things past due, three today, one window at risk.</p>
    </StaffShell>
  );
}

/** The participant's frame round an empty page. */
export function PhoneShellExample() {
  return (
    <PhoneShell
      study="Steady Lift"
      right="NM-0042"
      gone={9 / 24}
      urgentHref="/gallery"
      tabs={[
        { href: '/shell-example/week', label: 'This week', current: true },
        { href: '/shell-example/arm', label: 'My arm' },
        { href: '/shell-example/lifting', label: 'My lifting' },
        { href: '/shell-example/questions', label: 'Questions', count: 1 },
        { href: '/shell-example/consent', label: 'My consent' },
      ]}
    >
      <h1>Week 38</h1>
      <p className="phone-lede">1 to 7 March. Two sessions and a short arm check.</p>
    </PhoneShell>
  );
}
