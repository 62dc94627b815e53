import { randomInt } from 'node:crypto';
import type { Work } from '@/lib/work/work';

/** One person of an extract. The number is random and kept nowhere: nobody can lead it back to the code. */
export interface PersonOfExtract {
  readonly participantId: string;
  readonly studyNumber: string;
  readonly siteNumber: number;
  /** Last day whose data may leave; null for no limit. */
  readonly until: string | null;
}

/** How many there are, and who stays out and why. */
export interface PeopleCounts {
  readonly enrolled: number;
  readonly included: number;
  /** Said no to sharing, in the latest complete consent. */
  readonly saidNo: number;
  /** Were never asked about sharing; without a yes nothing is shared. */
  readonly notAsked: number;
  /** Included until the day they asked for no further data. */
  readonly cutShort: number;
}

interface Row {
  id: string;
  site_id: string;
  until: string | null;
  sharing: string | null;
}

/** Everybody enrolled with the answer to sharing of the latest complete consent. One statement. */
const readPeople = (work: Work): Promise<Row[]> =>
  work.sql<Row>(
    `select p.id, p.site_id, case when p.left_grade = 'no further data' then p.left_on::text end as until, c.sharing
     from participant p
     left join lateral (select permissions ->> 'data-sharing' as sharing from consent
       where participant_id = p.id and state = 'complete' order by participant_signed_at desc, id limit 1) c on true`,
  );

function countPeople(rows: readonly Row[]): PeopleCounts {
  const said = (answer: string | null) => rows.filter(({ sharing }) => sharing === answer);
  const yes = said('yes');
  const no = said('no').length;
  return { enrolled: rows.length, included: yes.length, saidNo: no, notAsked: rows.length - yes.length - no, cutShort: yes.filter(({ until }) => until !== null).length };
}

/** Distinct numbers drawn from the machine's own randomness, in no order. */
function drawNumbers(count: number): string[] {
  const drawn = new Set<string>();
  while (drawn.size < count) drawn.add(`P${String(randomInt(10_000_000)).padStart(7, '0')}`);
  return [...drawn];
}

function shuffled<T>(list: readonly T[]): T[] {
  const cards = [...list];
  for (let last = cards.length - 1; last > 0; last -= 1) {
    const other = randomInt(last + 1);
    [cards[last], cards[other]] = [cards[other] as T, cards[last] as T];
  }
  return cards;
}

/** Who is in this extract, each under a new random number, with the sites numbered at random. */
export async function choosePeople(work: Work): Promise<{ people: PersonOfExtract[]; counts: PeopleCounts }> {
  const rows = await readPeople(work);
  const included = rows.filter(({ sharing }) => sharing === 'yes');
  const numbers = drawNumbers(included.length);
  const sites = shuffled([...new Set(rows.map(({ site_id }) => site_id))]);
  const people = included.map(({ id, site_id, until }, index) => ({ participantId: id, studyNumber: numbers[index] ?? '', siteNumber: sites.indexOf(site_id) + 1, until }));
  return { people, counts: countPeople(rows) };
}
