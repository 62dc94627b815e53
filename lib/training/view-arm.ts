import { highWater } from '@/instruments/swelling';
import { rvcMeasurementError } from '@/instruments/measurement/rvc-measurement-error';
import { findOwnRecord } from '@/lib/people/find-own-record';
import { findProtocol } from '@/lib/protocol/find-protocol';
import { localDate, moment } from '@/lib/work/time';
import type { Work } from '@/lib/work/work';

/** A participant's own arm over time: only completed measurements, no case label. */
export interface ArmView {
  readonly today: string;
  readonly affectedSide: 'left' | 'right';
  readonly siteName: string;
  /** Change against the start, percent, the oldest first; the first is the start itself. */
  readonly points: readonly { readonly on: string; readonly changePercent: number }[];
  /** How much a tape can vary on its own, percent. */
  readonly errorPercent: number;
  /** High water: from here on the site asks the person in, percent. */
  readonly thresholdPercent: number;
}

export async function viewArm(work: Work): Promise<ArmView> {
  const { participant, site, today } = await findOwnRecord(work);
  const protocol = await findProtocol(work, participant.protocolVersionId);
  const rows = await work.sql<{ measured_at: string; rvc: number | null }>(
    `select measured_at::text, rvc::float8 from limb_assessment where participant_id = ? and state = 'complete' order by measured_at`,
    [participant.id],
  );
  const points = rows.flatMap(({ measured_at, rvc }, index) => {
    const changePercent = index === 0 ? 0 : rvc === null ? null : rvc * 100;
    return changePercent === null ? [] : [{ on: localDate(moment(measured_at), site.timeZone), changePercent }];
  });
  return { today, affectedSide: participant.affectedSide, siteName: site.name, points, errorPercent: rvcMeasurementError(protocol.document.measurement.semPct), thresholdPercent: highWater(protocol.document.swelling.primary).percent };
}
