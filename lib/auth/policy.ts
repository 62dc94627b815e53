import { grantedRoles, type Role } from './roles';

/** What a role needs to do an act, and which doors the act opens in the data base. */
export interface Rule {
  readonly roles: readonly Role[];
  /** 'read' never changes the record; the transaction is opened read only. */
  readonly kind: 'read' | 'write';
  /** 'on' shows identity data to roles that reach it; 'sign-in' opens credentials, sessions and links. */
  readonly identity?: 'on' | 'sign-in';
}

const read = (...roles: Role[]): Rule => ({ roles, kind: 'read' });
const write = (...roles: Role[]): Rule => ({ roles, kind: 'write' });
const withIdentity = (rule: Rule): Rule => ({ ...rule, identity: 'on' });
const signIn = (rule: Rule): Rule => ({ ...rule, identity: 'sign-in' });

const siteTeam = ['site-coordinator', 'assessor', 'site-investigator'] as const;
const consenting = ['site-coordinator', 'site-investigator'] as const;
const recordReaders = [...siteTeam, 'monitor', 'data-manager', 'auditor'] as const;

/**
 * Who may do what: the one place. Acts and roles are closed lists; the whole matrix is a snapshot
 * in tests, so that a change of permission is one line of a diff.
 */
export const policy = {
  // Signing in, before anybody is known.
  'account.join': signIn(write('system')),
  'account.sign-in': signIn(write('system')),
  'account.sign-out': signIn(write('system')),
  'session.check': signIn(write('system')),
  'session.choose-role': signIn(write('system')),
  'session.hand-over': signIn(write('system')),
  'invitation.view': signIn(read('system')),
  // The public page: names of sites and how many take part, nothing else.
  'welcome.view': read('system'),
  // What the masthead says on every page.
  'shell.view': read(...grantedRoles),
  // The site's day.
  'today.view': read(...siteTeam),
  // Screening and consent.
  'screening.list': read(...siteTeam, 'monitor', 'data-manager', 'auditor'),
  'screening.view': read(...siteTeam, 'monitor', 'data-manager', 'auditor'),
  'screening.open': withIdentity(write(...consenting)),
  'screening.answer': write(...consenting),
  'screening.confirm': write('site-investigator'),
  'screening.leave': write(...consenting),
  'identity.view': withIdentity(write(...consenting)),
  'identity.correct': withIdentity(write(...consenting)),
  'consent.start': withIdentity(write(...consenting)),
  'consent.view': withIdentity(read(...consenting, 'invitee', 'participant')),
  // The participant's own acts: at home through the link, at the site with the tablet in hand. Staff never read or sign for them.
  'consent.read-part': withIdentity(write('invitee')),
  'consent.sign': withIdentity(write('invitee')),
  'consent.countersign': withIdentity(write(...consenting)),
  'consent.upload': withIdentity(write(...consenting)),
  'consent.file': withIdentity(write(...consenting, 'participant')),
  'consent.send-link': withIdentity(write(...consenting)),
  'participant.enrol': withIdentity(write(...consenting)),
  'participant.invite': withIdentity(write(...consenting)),
  // The record at the site.
  'participant.list': read(...recordReaders),
  'participant.view': read(...recordReaders),
  'participant.correct': write(...consenting),
  'participant.withdraw': write(...consenting, 'participant'),
  'visit.view': read(...recordReaders),
  'visit.book': write('site-coordinator'),
  'visit.begin': write('site-coordinator', 'assessor'),
  'visit.complete': write('site-coordinator', 'assessor'),
  'visit.miss': write('site-coordinator'),
  'visit.add': write('site-coordinator', 'site-investigator'),
  'visit.correct': write('site-coordinator', 'assessor'),
  'assessment.view': read(...recordReaders),
  'assessment.begin': write('site-coordinator', 'assessor'),
  'assessment.save-trial': write('site-coordinator', 'assessor'),
  'assessment.complete': write('site-coordinator', 'assessor'),
  'assessment.correct': write('site-coordinator', 'assessor'),
  // The margin.
  'history.view': read(...recordReaders),
  'query.list': read(...recordReaders),
  'query.raise': write('monitor', 'data-manager'),
  'query.answer': write('site-coordinator', 'assessor', 'site-investigator'),
  'query.close': write('monitor', 'data-manager'),
  'query.cancel': write('monitor', 'data-manager'),
  'query.ask-again': write('monitor', 'data-manager'),
  'query.remind': write('monitor', 'data-manager'),
  'verification.mark': write('monitor'),
  // The participant's own.
  'week.view': read('participant'),
  'arm.view': read('participant'),
  'lifting.view': read('participant'),
  'training.log': write('participant'),
  'questionnaire.list': read('participant'),
  'questionnaire.view': read('participant'),
  'questionnaire.save': write('participant'),
  'questionnaire.submit': write('participant'),
  'symptom.report': write('participant'),
  // Safety.
  'symptom.list': read(...siteTeam, 'monitor', 'data-manager', 'auditor'),
  'symptom.view': read(...siteTeam, 'monitor', 'data-manager', 'auditor'),
  'symptom.read': write('site-coordinator', 'site-investigator'),
  'symptom.review': write('site-coordinator', 'site-investigator'),
  'flag.see': write('site-coordinator', 'site-investigator'),
  // Results and what leaves the house.
  'results.view': read('investigator', 'data-manager', 'site-investigator'),
  'extract.list': read('investigator', 'data-manager', 'auditor'),
  'extract.view': read('investigator', 'data-manager', 'auditor'),
  'extract.preview': read('investigator', 'data-manager'),
  'extract.request': write('investigator', 'data-manager'),
  'extract.download': write('investigator', 'data-manager'),
  // The trail.
  'audit.list': read('site-coordinator', 'site-investigator', 'monitor', 'data-manager', 'auditor'),
  'audit.export': write('data-manager', 'auditor'),
  // Study set-up, people.
  'protocol.view': read(...siteTeam, 'monitor', 'investigator', 'data-manager', 'administrator', 'auditor'),
  'people.list': read('administrator', 'data-manager', 'auditor'),
  // Unattended work.
  'job.mail': { roles: ['system'], kind: 'write', identity: 'on' },
  'job.extract': write('system'),
  'job.mark-missed': write('system'),
  // Letters to a site's team go to the addresses they sign in with.
  'job.write-team': signIn(write('system')),
  // The seal covers every row of the trail, identity rows too; it keeps hashes only.
  'job.seal': { roles: ['system'], kind: 'write', identity: 'on' },
  'demo.seed': { roles: ['system'], kind: 'write', identity: 'on' },
} as const satisfies Record<string, Rule>;

export type Act = keyof typeof policy;

/** Whether a role may do an act. Screens ask it to hide what would be refused; withWork asks it to refuse. */
export const may = (role: Role, act: Act): boolean => (policy[act].roles as readonly Role[]).includes(role);

/** The rule of an act, widened to its shape. */
export const ruleOf = (act: Act): Rule => policy[act];
