import { randomUUID } from 'node:crypto';
import { beforeAll, beforeEach, describe, expect, test } from 'vitest';
import type { Actor } from '@/lib/auth/roles';
import { reportsLetter } from '@/lib/jobs/handlers/reports-letter';
import { reportsOverdue } from '@/lib/jobs/handlers/reports-overdue';
import { reportsWaiting } from '@/lib/jobs/handlers/reports-waiting';
import type { SendLetter } from '@/lib/mail/send-letter';
import { plainMoment } from '@/lib/people/plain-date';
import { checkArm } from '@/lib/safety/check-arm';
import type { ReportSymptomsInput } from '@/lib/safety/input';
import { markReportRead } from '@/lib/safety/mark-report-read';
import { reportSymptoms } from '@/lib/safety/report-symptoms';
import { withWork } from '@/lib/work/with-work';
import { asOwner, givenParticipant, givenProtocol, givenSite, givenStaff, givenStudy, jobDeps, type GivenParticipant, type GivenProtocol, type GivenSite, type GivenStudy } from '../given';

let study: GivenStudy;
let protocol: GivenProtocol;
let site: GivenSite;
let coordinator: Actor;
let investigator: Actor;
let person: GivenParticipant;

/** Somebody of a site with an address to write to. */
async function givenMember(role: Parameters<typeof givenStaff>[0], at: GivenSite, email: string): Promise<Actor> {
  const actor = await givenStaff(role, at);
  await asOwner('insert into credential (account_id, email) values ($1, $2)', [actor.accountId, email], 'sign-in');
  return actor;
}

const mark = () => randomUUID().slice(0, 8);

beforeAll(async () => {
  study = await givenStudy();
  protocol = await givenProtocol(study);
});

beforeEach(async () => {
  await asOwner(`delete from pgboss.job where name like 'reports.%'`);
  // What an earlier test left unread would be past its deadline here as well.
  await asOwner(`update symptom_report set state = 'read', read_at = now() where state = 'new'`);
  const [tag, elsewhere] = [mark(), await givenSite(study)];
  site = await givenSite(study, { timeZone: 'America/New_York' });
  coordinator = await givenMember('site-coordinator', site, `coordinator-${tag}@team.example`);
  investigator = await givenMember('site-investigator', site, `investigator-${tag}@team.example`);
  await givenMember('assessor', site, `assessor-${tag}@team.example`);
  await givenMember('monitor', site, `monitor-${tag}@team.example`);
  await givenMember('site-coordinator', elsewhere, `elsewhere-${tag}@team.example`);
  person = await givenParticipant(site, protocol, coordinator, { email: `person-${tag}@home.example` });
});

// 10:00 in New York, where a report of a heavier arm is due at the close of the next working day: 17:00 on Thursday, 22:00 UTC.
const wednesday = '2027-03-03T15:00:00Z';
const afterwards = '2027-03-04T22:10:00Z';
const at = (moment: string) => ({ now: new Date(moment) });
const said = { noticedOn: '2027-03-03', signs: ['heavy' as const], lastedOverADay: true, soreness: null, note: 'Since the long drive.' };
const sore: Partial<ReportSymptomsInput> = { signs: [], soreness: { days: 2, onlyTrainedMuscles: true } };
const report = (change: Partial<ReportSymptomsInput> = {}) =>
  withWork(person.actor, 'symptom.report', (work) => reportSymptoms(work, { clientKey: randomUUID(), ...said, ...change }), at(wednesday));
const read = (id: string) => withWork(coordinator, 'symptom.read', (work) => markReportRead(work, { id }), at('2027-03-03T16:00:00Z'));

interface Sent {
  letter: string;
  to: string;
  whole: string;
}

/** Takes what waits in the queue of a job, in order, as the worker does. */
async function takeWaiting(name: string): Promise<{ id: string; data: object }[]> {
  return asOwner(`delete from pgboss.job where name = $1 returning id, data`, [name]);
}

/** Runs every letter job that waits. What a receiver would see is kept. */
async function sendWaiting(when = wednesday): Promise<Sent[]> {
  const sent: Sent[] = [];
  const send: SendLetter = (letter, { to, data }) => {
    const { subject, text, html } = letter.renderRaw(data);
    sent.push({ letter: letter.name, to, whole: [subject, text, html].join('\n') });
    return Promise.resolve();
  };
  for (const { data } of await takeWaiting('reports.letter')) await reportsLetter.runRaw(data, jobDeps(send, new Date(when)));
  return sent.toSorted((one, other) => one.to.localeCompare(other.to));
}

const noMail: SendLetter = () => Promise.reject(new Error('No letter goes out here.'));
const runWaiting = async () => {
  const waiting = await takeWaiting('reports.waiting');
  for (const { data } of waiting) await reportsWaiting.runRaw(data, jobDeps(noMail, new Date(wednesday)));
  return waiting;
};
const runOverdue = (when = afterwards) => reportsOverdue.runRaw({}, jobDeps(noMail, new Date(when)));
const endRole = ({ accountId }: Actor) => asOwner(`update role_grant set ends_at = '2027-03-01T00:00:00Z' where account_id = $1`, [accountId]);
const roles = (sent: readonly Sent[]) => sent.map(({ to }) => to.split('-')[0]);

describe('a report that presses', () => {
  test('is written of to the coordinators and site investigators of its own site', async () => {
    await report();
    await runWaiting();
    const sent = await sendWaiting();
    expect(sent.map(({ letter }) => letter)).toEqual(['report-waiting', 'report-waiting']);
    expect(roles(sent)).toEqual(['coordinator', 'investigator']);
  });

  test('is not in the letter: no name, code, sign or address of the person, only site, time and the way to sign in', async () => {
    const { id } = await report({ signs: ['heavy', 'hot'] });
    await runWaiting();
    const [one] = await sendWaiting();
    // A hot arm is due four hours after it was reported: 14:00 in New York, which stands five hours behind UTC until 14 March 2027.
    expect(one?.whole).toContain('Wed 3 Mar 2027, 14:00, by the clock of America/New_York (UTC-05:00)');
    expect(one?.whole).toContain(site.name);
    expect(one?.whole).toContain('http://127.0.0.1:3000/safety');
    const [{ name, email } = { name: '', email: '' }] = await asOwner<{ name: string; email: string }>('select name, email from participant_identity where participant_id = $1', [person.id]);
    expect(name).toMatch(/^Ada Example/);
    for (const telling of [name, name.split(' ')[0] as string, email, person.code, person.id, id, said.note, 'heav', 'hot', 'R1', 'urgent', 'symptom', 'infection'])
      expect(one?.whole.toLowerCase()).not.toContain(telling.toLowerCase());
  });

  test('leaves ids in the queue, nothing else', async () => {
    await report();
    await runWaiting();
    for (const { data } of await takeWaiting('reports.letter')) expect(Object.keys(data).toSorted()).toEqual(['accountId', 'letter', 'reportId', 'siteId']);
  });

  test('goes to nobody whose role has ended, not even between the report and the letter', async () => {
    const late = await givenMember('site-coordinator', site, `late-${mark()}@team.example`);
    await endRole(investigator);
    await report();
    await runWaiting();
    await endRole(late);
    expect(roles(await sendWaiting())).toEqual(['coordinator']);
  });

  test('goes to nobody whose account is closed, and to nobody before a role begins', async () => {
    await asOwner(`update account set state = 'closed' where id = $1`, [investigator.accountId]);
    const next = await givenMember('site-coordinator', site, `next-${mark()}@team.example`);
    await asOwner(`update role_grant set starts_at = '2027-04-01' where account_id = $1`, [next.accountId]);
    await report();
    await runWaiting();
    expect(roles(await sendWaiting())).toEqual(['coordinator']);
  });

  test('is one letter to somebody with both roles', async () => {
    await asOwner(
      `insert into role_grant (account_id, study_id, role, label, site_ids, starts_at) select account_id, study_id, 'site-investigator', 'I-99', site_ids, starts_at from role_grant where account_id = $1`,
      [coordinator.accountId],
    );
    await report();
    await runWaiting();
    expect(roles(await sendWaiting())).toEqual(['coordinator', 'investigator']);
  });

  test('is written of once, although the job runs twice and the report is sent twice', async () => {
    const clientKey = randomUUID();
    const send = () => withWork(person.actor, 'symptom.report', (work) => reportSymptoms(work, { clientKey, ...said }), at(wednesday));
    await send();
    await send();
    const [job, ...others] = await runWaiting();
    expect(others).toEqual([]);
    await reportsWaiting.runRaw(job?.data, jobDeps(noMail, new Date(wednesday)));
    expect(await sendWaiting()).toHaveLength(2);
  });

  test('is not written of any more once somebody has opened it', async () => {
    const { id } = await report();
    await runWaiting();
    await read(id);
    expect(await sendWaiting()).toEqual([]);
    const other = await report();
    await read(other.id);
    await runWaiting();
    expect(await takeWaiting('reports.letter')).toEqual([]);
  });

  test('that is rolled back takes its letters with it', async () => {
    await expect(
      withWork(person.actor, 'symptom.report', async (work) => {
        await reportSymptoms(work, { clientKey: randomUUID(), ...said });
        await work.em.flush();
        throw new Error('The line broke.');
      }, at(wednesday)),
    ).rejects.toThrow('The line broke.');
    expect(await asOwner('select id from symptom_report where participant_id = $1', [person.id])).toEqual([]);
    expect(await takeWaiting('reports.waiting')).toEqual([]);
  });

  test('comes from the arm check before training as well; soreness writes to nobody', async () => {
    await report(sore);
    expect(await takeWaiting('reports.waiting')).toEqual([]);
    await withWork(person.actor, 'training.log', (work) => checkArm(work, { clientKey: randomUUID(), armCheck: 'clearly fuller' }), at(wednesday));
    expect(await takeWaiting('reports.waiting')).toHaveLength(1);
  });

  test('keeps the version that its reader saw', async () => {
    const { id } = await report();
    const version = async () => (await asOwner<{ version: number }>('select version from symptom_report where id = $1', [id]))[0]?.version;
    const before = await version();
    await runWaiting();
    await runOverdue();
    expect(await version()).toBe(before);
  });
});

describe('a report past its deadline', () => {
  test('is written of once to the site investigator', async () => {
    await report();
    await runOverdue();
    await runOverdue('2027-03-05T22:10:00Z');
    const sent = await sendWaiting(afterwards);
    expect(sent.map(({ letter }) => letter)).toEqual(['report-overdue']);
    expect(roles(sent)).toEqual(['investigator']);
    expect(sent[0]?.whole).toContain('Thu 4 Mar 2027, 17:00, by the clock of America/New_York (UTC-05:00)');
    expect(sent[0]?.whole).not.toContain(person.code);
  });

  test('waits for the deadline itself', async () => {
    await report();
    await runOverdue('2027-03-04T21:59:00Z');
    expect(await takeWaiting('reports.letter')).toEqual([]);
  });

  test('goes to the coordinators of a site without an investigator', async () => {
    await endRole(investigator);
    await report();
    await runOverdue();
    expect(roles(await sendWaiting(afterwards))).toEqual(['coordinator']);
  });

  test('is asked for again while there is nobody to write to', async () => {
    await report();
    await endRole(investigator);
    await endRole(coordinator);
    await runOverdue();
    expect(await takeWaiting('reports.letter')).toEqual([]);
    await givenMember('site-investigator', site, `new-${mark()}@team.example`);
    await runOverdue('2027-03-05T08:00:00Z');
    expect(roles(await sendWaiting('2027-03-05T08:01:00Z'))).toEqual(['new']);
  });

  test('is not written of when it was read in time, nor where nothing is due', async () => {
    const { id } = await report();
    await read(id);
    await report(sore);
    await runOverdue();
    expect(await takeWaiting('reports.letter')).toEqual([]);
  });

  test('two workers at the same moment write one letter', async () => {
    await report();
    await Promise.all([runOverdue(), runOverdue()]);
    expect(await sendWaiting(afterwards)).toHaveLength(1);
  });

  test('leaves its mark in the trail, signed by the system', async () => {
    const { id } = await report();
    await runOverdue();
    const rows = await asOwner<{ act: string; role: string }>(`select act, role from audit_entry where table_name = 'symptom_report' and row_id = $1 and after ->> 'overdue_letters_at' is not null`, [id]);
    expect(rows).toEqual([{ act: 'job.write-team', role: 'system' }]);
  });
});

describe('the moment in a letter', () => {
  // Offsets from the IANA time zone data base: London is on summer time from 28 March 2027, Kathmandu at 05:45 all year.
  test.each([
    ['2027-03-29T16:00:00Z', 'Europe/London', 'Mon 29 Mar 2027, 17:00, by the clock of Europe/London (UTC+01:00)'],
    ['2027-03-26T17:00:00Z', 'Europe/London', 'Fri 26 Mar 2027, 17:00, by the clock of Europe/London (UTC+00:00)'],
    ['2027-12-31T18:30:00Z', 'Asia/Kathmandu', 'Sat 1 Jan 2028, 00:15, by the clock of Asia/Kathmandu (UTC+05:45)'],
  ])('%s in %s', (moment, zone, words) => {
    expect(plainMoment(new Date(moment), zone)).toBe(words);
  });
});
