import { Button } from './button';
import { MarginRow, MarginSection, MarginSheet } from './margin-sheet';
import { EarlierValue, MonitorWords, Note, SiteWords, ValueHistory } from './note';
import { Ledger, Versions } from './ledger';

const open = (
  <Note
    kind="open"
    state="Query"
    number=" Q-0431, open"
    aside="14 days, with Northmoor"
    late
    actions={
      <>
        <Button kind="link">Remind</Button>
        <Button kind="link">Withdraw</Button>
      </>
    }
  >
    <MonitorWords by="M-01, 17 Feb 2027, 15:20">
      The training log for 2 Dec has the sleeve on until evening. Which is right, the form or the log?
    </MonitorWords>
  </Note>
);

const answered = (
  <Note
    kind="answered"
    state="Answered"
    number=", Q-0427"
    aside="1 day, with you"
    actions={
      <>
        <Button kind="primary" size="small">
          Accept and close
        </Button>
        <Button size="small">Ask again</Button>
      </>
    }
  >
    <MonitorWords by="M-01, 12 Feb 2027, 10:31">Had the elbow moved?</MonitorWords>
    <SiteWords by="C-03, 2 Mar 2027, 16:05">Yes, it bent. Trial 2 corrected.</SiteWords>
  </Note>
);

const history = (
  <Note kind="history" state="History" number=", changed once" aside="seen again 12 Feb">
    <ValueHistory
      values={[
        { value: '74.1', reason: 'first entered', by: 'C-03, 3 Dec 2026, 11:40' },
        {
          value: '71.4',
          reason: '“Digits changed places when copied from the scale sheet.”',
          by: 'C-03, 4 Dec 2026, 09:12',
          current: true,
        },
      ]}
    />
  </Note>
);

/** A form with its margin. */
export function MarginSheetExamples() {
  return (
    <MarginSheet label="Limb and symptoms">
      <MarginSection no="1" title="Before measuring">
        <MarginRow id="m11" no="1.1" label="Date of visit" seen>
          3 Dec 2026
        </MarginRow>
        <MarginRow id="m12" no="1.2" label="Sleeve worn in the last 12 hours" seen={false} notes={[{ key: 'q1', node: open }]}>
          No
        </MarginRow>
        <MarginRow id="m13" no="1.3" label="Hours since last training" seen>
          <span className="t-num">26</span> h
        </MarginRow>
        <MarginRow id="m14" no="1.4" label="Body weight" seen notes={[{ key: 'h', node: history }]}>
          <EarlierValue>74.1</EarlierValue> <span className="t-num">71.4</span> kg
        </MarginRow>
      </MarginSection>
      <MarginSection no="2" title="Symptoms at the visit" aside="three asked">
        <MarginRow id="m21" no="2.1" label="Swelling noticed, where" seen={false} current notes={[{ key: 'q2', node: answered }]}>
          Yes, hand
        </MarginRow>
        <MarginRow id="m22" no="2.2" label="Remarks" seen long>
          Carried shopping on the left the day before. No change to training; arm check again in a week.
        </MarginRow>
      </MarginSection>
      <div className="h-40" />
    </MarginSheet>
  );
}

/** Steps of a release, and versions of a protocol. */
export function LedgerExamples() {
  return (
    <div className="grid gap-10 sm:grid-cols-2">
      <div className="max-w-[320px]">
        <Ledger
          label="Way of the extract"
          steps={[
            { key: 'asked', state: 'done', title: 'Asked for', when: '26 Feb', children: 'R-02, for the first paper' },
            { key: 'checked', state: 'now', title: 'Checked for risk', when: 'today', children: 'D-01 reads the small groups' },
            { key: 'released', state: 'to-come', title: 'Released' },
          ]}
        />
      </div>
      <div className="max-w-[320px]">
        <Versions
          label="Protocol versions"
          versions={[
            {
              key: '2.2',
              title: 'Version 2.2, draft',
              when: 'not in force',
              draft: true,
              children: (
                <>
                  Window of Month 12 <del>±28</del> <ins>±21</ins> days
                </>
              ),
            },
            { key: '2.1', title: 'Version 2.1', when: '1 Oct 2026', children: 'In force at all sites' },
          ]}
        />
      </div>
    </div>
  );
}
