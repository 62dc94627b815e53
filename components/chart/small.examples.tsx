import { Button } from '../ui/button';
import { ArmTide } from './arm-tide';
import { LoadScale } from './load-scale';
import { RecruitmentChart } from './recruitment-chart';
import { SevenDayStaff } from './seven-day-staff';
import { AgeSpan, SealedDays, Sparkline } from './small-charts';

/** The participant's drawings at phone width. */
export function PhoneChartExamples() {
  return (
    <div className="on-phone flex flex-wrap gap-10 text-[18px] leading-[27px]">
      <div className="w-[350px] max-w-full">
        <SevenDayStaff
          label="Week 38, 1 to 7 March"
          days={[
            { day: '2027-03-01', weekday: 'Mon', date: 1 },
            { day: '2027-03-02', weekday: 'Tue', date: 2 },
            {
              day: '2027-03-03',
              weekday: 'Wed',
              date: 3,
              today: true,
              items: (
                <>
                  <p>
                    <b>10:00</b> Month 9 visit, Northmoor
                  </p>
                  <p>
                    <b>Session 1</b>, about 20 minutes
                  </p>
                  <Button kind="primary" size="phone" wide className="mt-2">
                    Start session 1
                  </Button>
                </>
              ),
            },
            { day: '2027-03-04', weekday: 'Thu', date: 4 },
            { day: '2027-03-05', weekday: 'Fri', date: 5 },
            {
              day: '2027-03-06',
              weekday: 'Sat',
              date: 6,
              items: (
                <p>
                  <b>Session 2</b>
                </p>
              ),
            },
            {
              day: '2027-03-07',
              weekday: 'Sun',
              date: 7,
              items: (
                <p>
                  <b>Arm check</b>, two questions
                </p>
              ),
            },
          ]}
        />
      </div>
      <div className="grid w-[350px] max-w-full content-start gap-6">
        <LoadScale yoursKg={7} lastWeekKg={6} upToKg={8} outsideKg={11} />
        <LoadScale yoursKg={9} lastWeekKg={6} upToKg={8} outsideKg={11} />
        <LoadScale yoursKg={1.5} lastWeekKg={null} upToKg={2} outsideKg={5} />
      </div>
      <div className="w-[350px] max-w-full">
        <ArmTide
          thresholdPercent={10}
          errorPercent={3.1}
          finding="Today your left arm measures a little fuller than at the start, and less than in January."
          points={[
            { on: '2026-06-09', changePercent: 0 },
            { on: '2026-09-11', changePercent: 1.4 },
            { on: '2026-12-03', changePercent: 4 },
            { on: '2027-01-21', changePercent: 7.3, words: 'fuller in January' },
            { on: '2027-03-03', changePercent: 5.1, provisional: true, words: 'today' },
          ]}
        />
      </div>
    </div>
  );
}

const sealed = Array.from({ length: 60 }, (_, index) => ({
  day: `day-${String(index).padStart(2, '0')}`,
  entries: index % 7 < 5 ? 40 + ((index * 13) % 29) : 5,
}));

/** Drawings that stand in margins, rows and heads. */
export function SmallChartExamples() {
  return (
    <div className="grid gap-8">
      <div className="flex flex-wrap items-start gap-10">
        <RecruitmentChart
          from="2025-06-01"
          to="2027-11-30"
          today="2027-03-03"
          target={80}
          pacePerDay={0.089}
          enrolled={[
            { on: '2025-06-01', count: 0 },
            { on: '2025-12-01', count: 13 },
            { on: '2026-06-01', count: 27 },
            { on: '2026-12-01', count: 44 },
            { on: '2027-03-03', count: 52 },
          ]}
          label="52 of 80 recruited; the plan was 57 by today."
        />
        <div className="grid gap-4">
          <AgeSpan days={29} limitDays={14} />
          <AgeSpan days={6} limitDays={14} />
          <Sparkline values={[0, 1.4, 4, null, 7.3, 5]} label="Change from baseline, last 5.0 %" />
        </div>
      </div>
      <SealedDays
        days={sealed}
        openDay="day-59"
        marks={[
          { day: 'day-00', words: '4 Jan 2027' },
          { day: 'day-59', words: 'today, open' },
        ]}
        label="Entries a day, every day sealed."
      />
      <SealedDays days={sealed} cutAt="day-41" label="Entries a day; the line is cut at day 41." />
    </div>
  );
}
