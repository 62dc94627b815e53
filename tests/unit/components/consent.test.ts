import { QueryClient, QueryClientProvider } from '@tanstack/react-query';
import { createElement, type ReactElement } from 'react';
import { renderToStaticMarkup } from 'react-dom/server';
import { expect, test, vi } from 'vitest';
import { ConsentReader } from '@/components/consent/consent-reader';
import { EnrolForm } from '@/components/screening/enrol-form';
import { JoinForm } from '@/components/join/join-form';
import { ToastProvider } from '@/components/ui/toast';

vi.mock('next/navigation', () => ({ useRouter: () => ({ push: () => undefined, refresh: () => undefined }) }));

const show = (element: ReactElement): string =>
  renderToStaticMarkup(createElement(QueryClientProvider, { client: new QueryClient() }, createElement(ToastProvider, null, element)));

const consent = {
  id: '00000000-0000-4000-8000-00000000000a',
  formNumber: '1.0',
  form: {
    title: 'Taking part',
    sections: [
      { key: 'main', title: 'The main points', paragraphs: ['You choose.'] },
      { key: 'ask', title: 'What we ask of you', paragraphs: ['You lift twice a week.'], newSince: 'We now ask about daily life.' },
    ],
    statements: [{ key: 'free', text: 'I may stop at any time.' }],
    permissions: [{ key: 'sharing', text: 'My data may be shared.' }],
  },
  sectionsRead: [] as string[],
  site: { name: 'Northmoor', phone: '+44 1632 960100', email: 'northmoor@tidemark.example', timeZone: 'Europe/London' },
};

test('reading begins at the first part that was not read, says how far it is, and whom to ask', () => {
  expect(show(createElement(ConsentReader, { consent }))).toContain('Part 1 of 2, about a minute');
  const resumed = show(createElement(ConsentReader, { consent: { ...consent, sectionsRead: ['main'] } }));
  expect(resumed).toContain('Part 2 of 2');
  expect(resumed).toContain('What we ask of you');
  expect(resumed).toContain('We now ask about daily life.');
  expect(resumed).toContain('href="tel:+441632960100"');
});

test('once all parts are read, the agreement stands there with nothing preset', () => {
  const markup = show(createElement(ConsentReader, { consent: { ...consent, sectionsRead: ['main', 'ask'] } }));
  expect(markup).toContain('All two parts read');
  expect(markup.match(/type="radio"/g)).toHaveLength(2);
  expect(markup.match(/type="checkbox"/g)).toHaveLength(1);
  expect(markup).not.toMatch(/checked=""/);
});

test('the rule for a password is said before anything is typed', () => {
  expect(show(createElement(JoinForm, { token: 'x'.repeat(43) }))).toContain('At least 12 characters.');
});

test('the facts of enrolment have no preset either', () => {
  const markup = show(createElement(EnrolForm, { screeningId: consent.id, today: '2027-03-01' }));
  expect(markup).not.toMatch(/checked=""/);
  expect(markup).toContain('Affected side');
});
