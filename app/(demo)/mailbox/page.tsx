import type { Metadata } from 'next';
import Link from 'next/link';
import { notFound } from 'next/navigation';
import { PlainShell } from '@/components/shell/plain-shell';
import { formatMoment } from '@/components/ui/format';
import { PageHead } from '@/components/ui/page';
import { Empty } from '@/components/ui/waiting';
import { hasDemoMailbox, listCapturedLetters, readCapturedLetter } from '@/lib/mail/demo-mailbox';

export const metadata: Metadata = { title: 'Demo mailbox' };
export const dynamic = 'force-dynamic';

/** Addresses inside a letter become links, so that an invitation can be opened with one press. */
function Linked({ text }: { text: string }) {
  return text.split(/(https?:\/\/[^\s<>"]+)/).map((part, index) =>
    index % 2 === 1 ? (
      <a key={index} className="btn-link break-all" href={part}>
        {part}
      </a>
    ) : (
      part
    ),
  );
}

/** The letters the demonstration would have sent. Without the demonstration there is no such page. */
export default async function MailboxPage({ searchParams }: { searchParams: Promise<Record<string, string | string[] | undefined>> }) {
  if (!hasDemoMailbox()) notFound();
  const { letter: wanted } = await searchParams;
  const letters = await listCapturedLetters();
  const letter = typeof wanted === 'string' ? await readCapturedLetter(wanted) : null;
  return (
    <PlainShell footer={<span>Demonstration only: no letter leaves this machine.</span>}>
      <PageHead title="Demo mailbox" lede="Every letter the registry would have sent, newest first. Times are UTC." />
      <div className="mt-6 grid gap-10 lg:grid-cols-2">
        <ul>
          {letters.length === 0 ? <Empty title="No letter yet">Invitations, consent links, queries and participants’ reports send one.</Empty> : null}
          {letters.map(({ id, at, to, subject }) => (
            <li key={id} className="border-b border-rule py-2.5">
              <Link className="btn-link" href={`/mailbox?letter=${encodeURIComponent(id)}`} aria-current={letter?.id === id ? 'true' : undefined}>
                {subject}
              </Link>
              <span className="block text-[13.5px] text-ink-2">
                {to.join(', ')}, {formatMoment(new Date(at), 'UTC')}
              </span>
            </li>
          ))}
        </ul>
        {letter ? (
          <article aria-label={letter.subject}>
            <h2>{letter.subject}</h2>
            <p className="t-small text-ink-2">
              From {letter.from} to {letter.to.join(', ')}
            </p>
            <p className="mt-4 whitespace-pre-wrap break-words">
              <Linked text={letter.text} />
            </p>
            {letter.attachments.length > 0 ? <p className="t-small mt-4 text-ink-2">With it: {letter.attachments.map(({ filename }) => filename).join(', ')}</p> : null}
          </article>
        ) : null}
      </div>
    </PlainShell>
  );
}
