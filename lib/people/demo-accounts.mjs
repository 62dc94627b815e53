/**
 * The demonstration's sign-ins: invented people, addresses that lead nowhere, one password for all.
 * The seed makes these accounts, `npm start` prints them, the browser tests use them. They exist in demonstrations only.
 *
 * @typedef {object} DemoAccount
 * @property {string} key name of the account in tests
 * @property {'site-coordinator' | 'assessor' | 'site-investigator' | 'monitor' | 'investigator' | 'data-manager' | 'administrator' | 'auditor' | 'participant'} role
 * @property {string} roleLabel the role in words
 * @property {string | null} siteName null: the whole study
 * @property {string} name
 * @property {string} email
 * @property {string} password
 */

export const demoPassword = 'slack-water-lantern-9';

/** @type {(key: string, role: DemoAccount['role'], roleLabel: string, siteName: string | null, name: string) => DemoAccount} */
const account = (key, role, roleLabel, siteName, name) => ({
  key, role, roleLabel, siteName, name, email: `${key}@tidemark.example`, password: demoPassword,
});

/** @type {readonly DemoAccount[]} */
export const demoAccounts = [
  account('coordinator', 'site-coordinator', 'Site coordinator', 'Northmoor', 'Robin Ashdown'),
  account('assessor', 'assessor', 'Assessor', 'Northmoor', 'Imre Castell'),
  account('site-investigator', 'site-investigator', 'Site investigator', 'Northmoor', 'Dr Hester Vale'),
  account('coordinator-saltmarsh', 'site-coordinator', 'Site coordinator, and assessor at two sites', 'Saltmarsh', 'Perpetua Lark'),
  account('monitor', 'monitor', 'Monitor', null, 'Tomas Wren'),
  account('investigator', 'investigator', 'Investigator', null, 'Prof. Odile Marsh'),
  account('data-manager', 'data-manager', 'Data manager', null, 'Sunniva Falk'),
  account('administrator', 'administrator', 'Administrator', null, 'Pascal Thorne'),
  account('auditor', 'auditor', 'Auditor', null, 'Greta Lindow'),
  account('participant-one', 'participant', 'Participant', 'Northmoor', 'Marian Holt'),
  account('participant-two', 'participant', 'Participant', 'Northmoor', 'Delia Frost'),
];
