import { findQuestionnaire } from '@/instruments/questionnaires';
import { visitWindow } from '@/instruments/calendar';
import type { Protocol } from '@/lib/protocol/find-protocol';
import { Refusal } from '@/lib/work/refusal';
import type { Work } from '@/lib/work/work';

/** Whose schedule, and from which day it counts. */
export interface ScheduleFor {
  readonly siteId: string;
  readonly participantId: string;
  readonly anchorOn: string;
  readonly protocol: Protocol;
}

/**
 * Lays out every visit of the protocol with its window, and the questionnaires due with it.
 * @returns how many visits were laid out.
 * @throws Refusal 'conflict' when the protocol names a questionnaire that is not there.
 */
export async function layOutSchedule(work: Work, { siteId, participantId, anchorOn, protocol }: ScheduleFor): Promise<number> {
  for (const { key, name, offsetDays, earlyDays, lateDays, questionnaires } of protocol.document.visits) {
    const window = visitWindow({ anchorOn, offsetDays, beforeDays: earlyDays, afterDays: lateDays });
    const [visit] = await work.sql<{ id: string }>(
      'insert into visit (site_id, participant_id, key, name, target_on, opens_on, closes_on, protocol_version_id) values (?, ?, ?, ?, ?, ?, ?, ?) returning id',
      [siteId, participantId, key, name, window.targetOn, window.opensOn, window.closesOn, protocol.id],
    );
    for (const instrument of questionnaires) {
      const found = findQuestionnaire(instrument);
      if (!found) throw new Refusal('conflict', `The protocol names a questionnaire that is not there (${instrument}). Tell the data manager.`);
      await work.sql(
        `insert into questionnaire_response (site_id, participant_id, visit_id, instrument, instrument_version, due_on, opens_on, closes_on) values (?, ?, ?, ?, ?, ?, ?, ?)`,
        [siteId, participantId, visit?.id ?? null, instrument, found.version, window.targetOn, window.opensOn, window.closesOn],
      );
    }
  }
  return protocol.document.visits.length;
}
