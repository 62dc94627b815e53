import type { ArmView } from '@/lib/training/view-arm';
import { ArmTide } from '../chart/arm-tide';
import { formatDate, formatNumber } from '../ui/format';

const months = ['January', 'February', 'March', 'April', 'May', 'June', 'July', 'August', 'September', 'October', 'November', 'December'];
const monthOf = (on: string): string => months[Number(on.slice(5, 7)) - 1] ?? on;

/** What the last measurement shows, in words. Inside the tape's own error it is 'about the same'. */
function sizeWords(changePercent: number, errorPercent: number): string {
  if (Math.abs(changePercent) <= errorPercent) return 'about the same';
  if (changePercent < 0) return 'smaller';
  return changePercent <= errorPercent * 2 ? 'a little fuller' : 'fuller';
}

const percentWords = (changePercent: number): string =>
  Math.abs(changePercent) < 0.05 ? 'the same as at the start' : `${formatNumber(Math.abs(changePercent), 1)}\u202f% ${changePercent > 0 ? 'more' : 'less'} than at the start`;

/** A participant's own arm in plain words: no case label, only completed measurements. */
export function MyArm({ arm }: { arm: ArmView }) {
  const { points, errorPercent, thresholdPercent, affectedSide, siteName, today } = arm;
  const last = points.at(-1);
  if (!last)
    return (
      <>
        <h1>My arm</h1>
        <p className="phone-lede">Nothing is measured yet. {siteName} measures both arms at your first visit; after that the course stands here.</p>
      </>
    );
  const first = points.length === 1;
  const words = sizeWords(last.changePercent, errorPercent);
  const when = last.on === today ? 'Today' : `On ${formatDate(last.on)}`;
  const fullest = points.reduce((a, b) => (b.changePercent > a.changePercent ? b : a));
  const showsPeak = fullest !== last && fullest.changePercent > errorPercent && fullest.changePercent > last.changePercent;
  const finding = first
    ? `${when} both your arms were measured for the first time. Later visits are compared with this one.`
    : `${when} your ${affectedSide} arm measured ${words}${words === 'about the same' ? ' as' : ' than'} at the start${showsPeak ? `, and less than in ${monthOf(fullest.on)}` : ''}.`;
  return (
    <>
      <h1>My arm</h1>
      <p className="mt-1">{finding}</p>
      <div className="mt-6">
        <ArmTide
          finding={finding}
          errorPercent={errorPercent}
          thresholdPercent={thresholdPercent}
          points={points.map((point) => ({
            ...point,
            ...(point === last ? { words: last.on === today ? 'today' : 'last time' } : showsPeak && point === fullest ? { words: `fuller in ${monthOf(point.on)}` } : {}),
          }))}
        />
      </div>
      <div className="mt-1 border-t border-rule pt-3 text-[16px] leading-[23px] text-ink-2">
        <p>The blue band is how much a tape can vary on its own. A change inside it may be no change at all.</p>
        {first ? null : (
          <p className="mt-1.5">
            Numbers: {percentWords(last.changePercent)}
            {showsPeak ? `, ${formatNumber(fullest.changePercent, 1)}\u202f% in ${monthOf(fullest.on)}` : ''}. The other arm is taken into account.
          </p>
        )}
        <p className="mt-3 font-semibold text-ink">This does not replace your clinician’s advice.</p>
      </div>
    </>
  );
}
