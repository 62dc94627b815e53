/** The closed list of roles. `system` and `invitee` are never granted: they act for a job, and for the holder of a link. */
export const grantedRoles = [
  'participant',
  'site-coordinator',
  'assessor',
  'site-investigator',
  'monitor',
  'investigator',
  'data-manager',
  'administrator',
  'auditor',
] as const;
export type GrantedRole = (typeof grantedRoles)[number];
export type Role = GrantedRole | 'system' | 'invitee';

/** Roles in words, as the header shows them. */
export const roleNames: Record<Role, string> = {
  participant: 'Participant',
  'site-coordinator': 'Site coordinator',
  assessor: 'Assessor',
  'site-investigator': 'Site investigator',
  monitor: 'Monitor',
  investigator: 'Investigator',
  'data-manager': 'Data manager',
  administrator: 'Administrator',
  auditor: 'Auditor',
  system: 'Tidemark',
  invitee: 'Invited person',
};

/** Who acts, in which role, and how far the reach goes. Made by lib/auth only. */
export interface Actor {
  readonly accountId: string;
  readonly role: Role;
  /** 'C-03': how by-lines name the person. */
  readonly label: string;
  readonly studyId: string | null;
  /** Site ids in reach; rows of other sites do not exist for this actor. */
  readonly reach: readonly string[];
  /** Set for a participant: only this record exists. */
  readonly participantId: string | null;
  /** Set for the holder of a consent link: only this screening exists. */
  readonly screeningId: string | null;
  /** The clinic's tablet in the participant's hands: an invited person who needs no link. */
  readonly atTablet?: true;
}

/** The account every unattended act is signed with; made by the first migration of data. */
export const systemAccountId = '00000000-0000-4000-8000-000000000001';
/** The account an invited person acts under until they have one of their own. */
export const inviteeAccountId = '00000000-0000-4000-8000-000000000002';
/** Stands for 'no participant at all': an invited person reaches no participant's record. */
export const nobody = '00000000-0000-0000-0000-000000000000';

/** The system as an actor, with the sites it may touch for this act. */
export const systemActor = (reach: readonly string[] = []): Actor => ({
  accountId: systemAccountId,
  role: 'system',
  label: 'Tidemark',
  studyId: null,
  reach,
  participantId: null,
  screeningId: null,
});
