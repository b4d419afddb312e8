import { cardSchema, type Card } from '@/shared/cards.ts';
import { parsedOr } from './call.ts';

/**
 * The last plate cards read on this device, so that one read at the machine stays readable when the hall's network fails.
 * They are the plant's own: forgotten at sign-out and at a change of plant.
 */
const prefix = 'cinderpath.card.';
const most = 20;

export function keepCard(address: string, card: Card): void {
  try {
    window.localStorage.setItem(prefix + address, JSON.stringify(card));
    const kept = keptKeys().map((key) => ({ key, asOf: keptAt(key) }));
    kept.sort((a, b) => b.asOf.localeCompare(a.asOf));
    for (const { key } of kept.slice(most)) window.localStorage.removeItem(key);
  } catch {
    // No room or no storage: the card on the screen is not touched by that.
  }
}

export function keptCard(address: string): Card | null {
  try {
    const text = window.localStorage.getItem(prefix + address);
    return text === null ? null : parsedOr(cardSchema, JSON.parse(text));
  } catch {
    return null;
  }
}

export function forgetKeptCards(): void {
  try {
    for (const key of keptKeys()) window.localStorage.removeItem(key);
  } catch {
    // Nothing was kept then.
  }
}

const keptKeys = (): string[] => Object.keys(window.localStorage).filter((key) => key.startsWith(prefix));

function keptAt(key: string): string {
  const card = keptCard(key.slice(prefix.length));
  return card?.asOf ?? '';
}
