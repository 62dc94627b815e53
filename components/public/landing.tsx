import type { WelcomeView } from '@/lib/today/view-welcome';
import { Brand } from '../shell/brand';
import { ButtonLink } from '../ui/button';
import { Caution } from '../ui/caution';
import { formatCount } from '../ui/format';
import { Gauge } from '../ui/gauge';
import { Neatline } from '../ui/neatline';
import { PlainTable } from '../ui/plain-table';
import { Dash, DoneTick } from '../ui/signs';
import { ArmCoast } from './arm-coast';
import type { ReactNode } from 'react';

const numbers = ['No', 'One', 'Two', 'Three', 'Four', 'Five', 'Six', 'Seven', 'Eight', 'Nine'];

/** The public page of the study: what it asks, who can join, what becomes of the data, where to write. */
export function Landing({ view }: { view: WelcomeView | null }) {
  const month = view?.month ?? { gone: 0, of: 48 };
  return (
    <div className="shell">
      <header className="public-head">
        <Brand href="/welcome" />
        {view ? <span className="border-l border-rule-2 pl-3.5 sm:pl-5">{view.studyName}</span> : null}
        <nav aria-label="On this page">
          <a href="#ask">What it is</a>
          <a href="#join">Who can join</a>
          <a href="#data">Your data</a>
          <a href="#sites">Contact</a>
        </nav>
        <ButtonLink href="/sign-in">Sign in</ButtonLink>
      </header>
      <Neatline segments={month.of} gone={month.of > 0 ? month.gone / month.of : 0} />
      <main id="main" tabIndex={-1}>
        <div className="hero">
          <ArmCoast width={1440} height={672} at={[1004, 356]} leanDegrees={-14} fades />
          <div className="hero-words">
            <h1>What does lifting, little by little, do to an arm’s swelling?</h1>
            <p>
              After breast-cancer treatment some people’s arms swell. {view?.studyName ?? 'This study'} follows people who train with weights, and measures both their arms for two years, to find
              out whether the two go together.
            </p>
            <div className="mt-8 flex flex-wrap gap-3.5">
              <ButtonLink kind="primary" size="phone" href="#join">
                See if you can join
              </ButtonLink>
              <ButtonLink size="phone" href="#ask">
                How it works
              </ButtonLink>
            </div>
          </div>
          <p className="hero-caption">An arm drawn as a coast. The figures are girths in cm, every 4 cm.</p>
        </div>
        <Ask />
        <Join />
        <Part id="data" title="What becomes of your data">
          <div className="t-prose grid max-w-[680px] gap-3.5">
            <p>Your name stays at your site. Everyone else sees a code. Every change to your record is kept, with who made it, when and why.</p>
            <p>Researchers receive days instead of dates and bands instead of ages. You can stop at any time without giving a reason, and ask what has been kept.</p>
          </div>
        </Part>
        {view ? <Sites sites={view.sites} /> : null}
        <div className="mx-5 my-8 sm:mx-14">
          <Caution title="Arm hot, red or suddenly swollen, or a fever?">Do not write to us. Seek urgent care. Nothing on this page replaces your clinician’s advice.</Caution>
        </div>
      </main>
      <footer className="shell-foot">
        <span>
          {view ? `${view.studyName}, study month ${month.gone} of ${month.of}` : 'No study is set up yet'}
        </span>
        <span>A research record. It does not diagnose, and it does not prescribe exercise.</span>
      </footer>
    </div>
  );
}

function Part({ id, title, children }: { id: string; title: string; children: ReactNode }) {
  return (
    <section id={id} className="public-part" aria-labelledby={`${id}-title`}>
      <h2 id={`${id}-title`}>{title}</h2>
      <div>{children}</div>
    </section>
  );
}

function Ask() {
  return (
    <Part id="ask" title="What we ask of you">
      <div className="public-three">
        <div>
          <h3>Lift, twice a week</h3>
          <p>Start at 1 or 2 kg. Add a little from week to week, only while the arm stays the same. You note it on your phone.</p>
        </div>
        <div>
          <h3>Be measured, seven times</h3>
          <p>A tape around both arms and a small electrical test you do not feel. Half an hour to an hour each time.</p>
        </div>
        <div>
          <h3>Tell us how the arm is</h3>
          <p>A short check before you lift. If something changes, your site calls you, and you hold the weights until then.</p>
        </div>
      </div>
    </Part>
  );
}

const lets = ['you are 18 or over', 'you were treated for cancer of one breast', 'your treatment touched the lymph nodes under the arm', 'you lift weights, or are about to begin'];
const keeps = ['the arm is hot, red or newly swollen: see a clinician first', 'you have been told not to lift', 'both sides were treated; the study compares one arm with the other'];

function Join() {
  return (
    <Part id="join" title="Who can join">
      <div className="public-two">
        <div>
          <h3 className="mb-2">You can, if</h3>
          <ul>
            {lets.map((line) => (
              <li key={line}>
                <DoneTick />
                {line}
              </li>
            ))}
          </ul>
        </div>
        <div>
          <h3 className="mb-2">Not now, if</h3>
          <ul>
            {keeps.map((line) => (
              <li key={line}>
                <Dash />
                {line}
              </li>
            ))}
          </ul>
        </div>
      </div>
      <p className="t-small mt-4 text-ink-2">Your site goes through every criterion with you before anything is recorded.</p>
    </Part>
  );
}

function Sites({ sites }: { sites: WelcomeView['sites'] }) {
  return (
    <Part id="sites" title={`${numbers[sites.length] ?? String(sites.length)} ${sites.length === 1 ? 'site' : 'sites'}`}>
      <PlainTable
        caption="Sites"
        rows={sites}
        getRowId={({ name }) => name}
        columns={[
          { id: 'site', header: 'Site', cell: ({ name }) => <span className="font-serif text-[18px]">{name}</span> },
          { id: 'count', header: 'Taking part', cell: ({ count, target }) => <Gauge state="part" size={84} level={target > 0 ? count / target : 0} word={`${formatCount(count)} of ${formatCount(target)}`} /> },
          {
            id: 'email',
            header: 'Write to',
            cell: ({ email }) => (
              <a className="btn-link" href={`mailto:${email}`}>
                {email}
              </a>
            ),
          },
        ]}
      />
    </Part>
  );
}
