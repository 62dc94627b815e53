import type { Page } from '@playwright/test';
import { ask } from './pages';

/** The code of a participant's own account, from the head of the own page. */
export async function codeOf(participant: Page): Promise<string> {
  await participant.goto('/week');
  const code = await participant.locator('.phone-right').first().textContent();
  if (!code) throw new Error('The page of this week shows no code.');
  return code.trim();
}

interface ListedVisit {
  readonly id: string;
  readonly name: string;
  readonly state: string;
}

/** A visit of a participant by its name, as the staff see it. */
export async function visitOf(staff: Page, code: string, name: string): Promise<ListedVisit> {
  const { visits } = await ask<{ visits: ListedVisit[] }>(staff, `/api/participants/${code}`);
  const found = visits.find((visit) => visit.name === name);
  if (!found) throw new Error(`${code} has no visit called ${name}.`);
  return found;
}
