import type { CompleteAssessmentView, VerdictView } from '@/lib/measurement/view-complete';
import { formatChange, formatDate, formatNumber, formatSigned, formatVolumeMl } from '../ui/format';
import { ChangeStaff } from './change-staff';

const verdictWords: Record<VerdictView['verdict'], string> = { met: 'Met', 'not met': 'Not met', 'not judged': 'Not judged' };

/** What the sitting came to; it exists only once both trials are saved. */
export function LimbResult({ view }: { view: CompleteAssessmentView }) {
  const { leftVolumeMl, rightVolumeMl, interLimb, rvc, errorPoints, affectedSide, earlier, formulaVersion } = view;
  return (
    <section className="limb-result" aria-labelledby="limb-result">
      <h3 id="limb-result">Result</h3>
      <dl>
        <dt>Left{affectedSide === 'left' ? ', affected' : ''}</dt>
        <dd>{formatVolumeMl(leftVolumeMl)}</dd>
        <dt>Right{affectedSide === 'right' ? ', affected' : ''}</dt>
        <dd>{formatVolumeMl(rightVolumeMl)}</dd>
        <dt>Affected minus other</dt>
        <dd>
          {interLimb.differenceMl === null ? 'not computed' : `${formatSigned(interLimb.differenceMl, 0)} mL`}
          {interLimb.differencePct === null ? '' : `, ${formatSigned(interLimb.differencePct)} %`}
        </dd>
        <dt className="limb-change">Change from baseline</dt>
        <dd className="limb-change">{rvc === null ? 'none' : formatChange(rvc)}</dd>
      </dl>
      {rvc === null ? (
        <p className="t-small text-ink-2">
          {earlier.length === 0 ? 'This is the first measurement; change is counted from the baseline.' : 'Change is not computed: there is no baseline that compares.'}
        </p>
      ) : (
        <ChangeStaff nowPct={rvc * 100} earlier={strokesOf(view)} highWaterPct={view.highWaterPct} errorPoints={errorPoints} />
      )}
      <p className="t-small mt-2 text-ink-2">
        Truncated cones between the marks, formula {formulaVersion}. Change is relative to the other arm. 95 of 100 changes by measurement error alone lie within ±
        {formatNumber(errorPoints, 1)} points.
      </p>
    </section>
  );
}

function strokesOf({ earlier }: CompleteAssessmentView) {
  return earlier.flatMap(({ visitName, on, rvc, isBaseline }) => {
    if (isBaseline) return [{ label: 'Baseline', changePct: 0 }];
    return rvc === null ? [] : [{ label: `${visitName}, ${formatDate(on)}`, changePct: rvc * 100 }];
  });
}

/** Each definition of swelling with its verdict, the primary one first. */
export function Verdicts({ view }: { view: CompleteAssessmentView }) {
  return (
    <section aria-labelledby="verdicts" className="mt-8">
      <h3 id="verdicts">By each definition</h3>
      <p className="t-small mt-1 text-ink-2">A definition sorts measurements for research. It is not a diagnosis; what follows for this person is the clinician’s to say.</p>
      <ul className="verdicts">
        {view.verdicts.map(({ code, name, sentence, verdict, reason, isPrimary }) => (
          <li key={code}>
            <b className={verdict === 'met' ? 'is-needs' : undefined}>{verdictWords[verdict]}</b>
            <div>
              <p>
                <b>{name}</b>
                {isPrimary ? ', the study’s primary definition' : null}
              </p>
              <p className="t-hand text-[16.5px] leading-[22px]">{sentence}</p>
              <p className="t-small text-ink-2">{reason}</p>
            </div>
          </li>
        ))}
      </ul>
    </section>
  );
}
