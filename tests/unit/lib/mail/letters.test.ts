import { describe, expect, it } from 'vitest';
import { letterNamed, letters } from '@/lib/mail';
import { html } from '@/lib/mail/define-letter';

/** Anyone may look at an inbox: these words would tell them why its owner is in the registry. */
const telling = /breast|cancer|lymph|swelling|tumou?r|surgery|arm\b|arms\b|volume|lifting|steady lift|oncolog/i;

it('letters are registered once each, in alphabetical order', () => {
  const names = letters.map(({ name }) => name);
  expect(names).toEqual([...new Set(names)].sort());
});

describe.each(letters.map((letter) => [letter.name, letter] as const))('the letter %s', (_name, letter) => {
  const { subject, text, html: markup } = letter.renderRaw(letter.exampleRaw);

  it('has a subject of one line and bodies of the same content', () => {
    expect(subject).toMatch(/^\S.{3,70}\S$/);
    for (const value of Object.values(letter.exampleRaw)) {
      expect(text + subject).toContain(String(value));
      expect(markup).toContain(String(value));
    }
  });

  it('names no diagnosis, study or measured value', () => {
    expect(`${subject}\n${text}\n${markup}`).not.toMatch(telling);
  });

  it('says where to turn when health worries', () => {
    expect(text).toContain('call your clinic or your local emergency number');
    expect(markup).toContain('call your clinic or your local emergency number');
  });

  it('refuses data it does not know', () => {
    expect(() => letter.renderRaw({ ...letter.exampleRaw, diagnosis: 'x' })).toThrow();
  });
});

it('a name cannot bring markup into a letter, nor a line break into its subject', () => {
  const rendered = letterNamed('participant-invitation').renderRaw({
    greetingName: '<img src=x onerror=alert(1)>', siteName: 'North\r\nBcc: all@example.example', url: 'https://registry.example/join/a?b=1&c=2', validDays: 14,
  });
  expect(rendered.html).not.toContain('<img');
  expect(rendered.subject).not.toMatch(/[\r\n]/);
  expect(html`<i>${'"&\''}</i>`).toBe('<i>&#34;&#38;&#39;</i>');
});

it('an unknown letter is refused by name', () => {
  expect(() => letterNamed('none')).toThrow(RangeError);
});
