import { expect, test } from 'vitest';
import { printConsent, type ConsentPrint } from '@/lib/consent/consent-pdf';
import { splitRuns, type Face } from '@/lib/consent/print-words';
import { pdfText } from '../../pdf-text';

const site = { name: 'Northmoor', phone: '+44 1632 960100', email: 'nm@tidemark.example', timeZone: 'Europe/London' };
const form = {
  title: 'Taking part',
  sections: [{ key: 'key-facts', title: 'The key facts', paragraphs: ['You may stop at any time. “Nothing” follows – your care stays the same.'] }],
  statements: [{ key: 'read', text: 'I have read this.' }],
  permissions: [{ key: 'data-sharing', text: 'My data may be shared.' }],
};
const signature = (who: 'participant' | 'staff', name: string, means = 'typed') => ({ who, means, name, signedAt: new Date('2027-03-03T19:06:00Z'), contentSha256: 'ab'.repeat(32), drawing: null });
const printed = async (name: string, change: Partial<ConsentPrint['consent']> = {}) =>
  pdfText(
    await printConsent({
      consent: { id: '00000000-0000-4000-8000-000000000009', formNumber: '1.0', form, permissions: { 'data-sharing': 'yes' }, site, ...change } as ConsentPrint['consent'],
      signatures: [signature('participant', name), signature('staff', 'Zoë Ørsted', 'drawn')],
      staffStatement: 'The person was free to choose.',
    }),
  );
const plain = (text: string): string => text.normalize('NFC').replace(/\s+/g, ' ');

test.each([
  ['Polish and Czech', 'Łucja Dvořáková'],
  ['Vietnamese', 'Ngọc Ánh Nguyễn'],
  ['Vietnamese, its marks typed apart', 'Ngọc Ánh'.normalize('NFD')],
  ['Turkish and Romanian', 'İpek Șerban-Ğ'],
  ['Welsh and Icelandic', 'Ŵyn Þórðardóttir'],
  ['Ukrainian', 'Олексій Ґудзь'],
  ['Greek', 'Αλεξάνδρα Ϊ́'],
  ['two scripts in one word', 'Anna-Ольга Łuk'],
])('a name prints as it is spelled: %s', async (_language, name) => {
  const { text, boxes } = await printed(name);
  expect(plain(text).replaceAll(' ', '')).toContain(`Participant${name}Signed`.normalize('NFC').replaceAll(' ', ''));
  expect(text).not.toContain('cannot print');
  expect(boxes).toBe(0);
});

test('what no face has is said, with its numbers, and is no box', async () => {
  const { text, boxes } = await printed('陈美 Anna');
  expect(plain(text)).toContain('[…] Anna');
  // Code points from the Unicode standard, CJK Unified Ideographs.
  expect(plain(text)).toContain('Where […] stands, this copy cannot print what was typed (Unicode U+9648 U+7F8E). The electronic record holds it as typed.');
  expect(boxes).toBe(0);
});

test('a form in another alphabet prints too, and so does the site', async () => {
  const { text, boxes } = await printed('Ada Example', { form: { ...form, title: 'Участь у дослідженні' }, site: { ...site, name: 'Bệnh viện Đà Nẵng' } });
  expect(plain(text)).toContain('Участь у дослідженні');
  expect(plain(text)).toContain('Bệnh viện Đà Nẵng');
  expect(boxes).toBe(0);
});

test('the whole form, the choice and both signatures stand in it, and every font is in the file', async () => {
  const { text, embedded } = await printed('Ada Example');
  for (const part of ['You may stop at any time. “Nothing” follows – your care stays the same.', '• I have read this.', 'YES: My data may be shared.', 'Ada Example', 'Zoë Ørsted', '3 Mar 2027, 19:06 (Europe/London)', 'ab'.repeat(32), 'Page 1 of 1'])
    expect(plain(text)).toContain(part);
  expect(embedded.toSorted()).toEqual(['AtkinsonHyperlegibleNext-Bold', 'AtkinsonHyperlegibleNext-Regular', 'Newsreader-Italic', 'Newsreader-Regular']);
});

const only = (letters: Partial<Record<Face, string>>) => (face: Face, piece: string) => [...piece].every((letter) => `${letters[face] ?? ''} […]`.includes(letter));

test('a word is not torn between faces when one of them has all of it', () => {
  const { runs, missing } = splitRuns('ab cd', 'note', only({ note: 'abc', prose: 'bcd' }));
  expect(runs).toEqual([
    { face: 'note', text: 'ab ' },
    { face: 'prose', text: 'cd' },
  ]);
  expect(missing).toEqual([]);
});

test('a letter keeps its mark, and a gap of several letters is one gap', () => {
  const { runs, missing } = splitRuns('ax̌yz', 'note', only({ note: 'axz', wide: 'x̌' }));
  expect(runs).toEqual([
    { face: 'note', text: 'a' },
    { face: 'wide', text: 'x̌' },
    { face: 'note', text: '[…]z' },
  ]);
  expect(missing).toEqual(['y']);
});

test('what has no sign of its own leaves no gap', () => {
  expect(splitRuns('a\u200Bb\u00ADc\u0007\nd', 'note', only({ note: 'abcd' }))).toEqual({ runs: [{ face: 'note', text: 'abc d' }], missing: [] });
});
