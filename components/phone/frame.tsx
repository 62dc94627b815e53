'use client';
import { usePathname } from 'next/navigation';
import { createContext, useContext, type ReactNode } from 'react';
import { PhoneShell, type PhoneShellProps } from '../shell/phone-shell';
import { UnsentLine } from './unsent-line';

export interface FrameFacts {
  readonly study: string;
  readonly code: string;
  /** Whose phone this is now: what is kept on it is kept under this. */
  readonly participantId: string;
  /** The participant's own two years, 0 to 1. */
  readonly gone: number;
  readonly questionsDue: number;
}

const Facts = createContext<FrameFacts | null>(null);

const tabs = [
  { href: '/week', label: 'This week' },
  { href: '/my-arm', label: 'My arm' },
  { href: '/my-lifting', label: 'My lifting' },
  { href: '/questions', label: 'Questions' },
  { href: '/my-consent', label: 'My consent' },
] as const;

/** Inside these the head is a way back and the tabs give way; they bring their own frame. */
const isTask = (path: string): boolean => path === '/log' || path === '/report' || path.startsWith('/questions/');

/** Round every participant page: the tabs, or nothing where a task brings its own head and foot. */
export function ParticipantFrame({ footer, children, ...facts }: FrameFacts & { footer: ReactNode; children: ReactNode }) {
  const path = usePathname();
  const { study, code, participantId, gone, questionsDue } = facts;
  if (isTask(path)) return <Facts value={facts}>{children}</Facts>;
  return (
    <PhoneShell
      study={study}
      right={code}
      gone={gone}
      urgentHref="/report"
      tabs={tabs.map((tab) => ({ ...tab, current: path === tab.href, ...(tab.href === '/questions' ? { count: questionsDue } : {}) }))}
      footer={footer}
    >
      <UnsentLine key={path} owner={participantId} />
      {children}
    </PhoneShell>
  );
}

export type TaskFrameProps = Pick<PhoneShellProps, 'right' | 'action' | 'hideCaution' | 'children'> & { back: { href: string; title: string } };

/** Who works here. */
export function useParticipantId(): string {
  const facts = useContext(Facts);
  if (!facts) throw new Error('A participant’s page needs a ParticipantFrame above it.');
  return facts.participantId;
}

/** Head and foot of one step of a task. */
export function TaskFrame(props: TaskFrameProps) {
  const facts = useContext(Facts);
  if (!facts) throw new Error('TaskFrame needs a ParticipantFrame above it.');
  return <PhoneShell study={facts.study} gone={facts.gone} urgentHref="/report" tabs={[]} {...props} />;
}
