import { queryOptions } from '@tanstack/react-query';
import type { QueryOf } from '@/shared/endpoint.ts';
import { cardEndpoints, type Card } from '@/shared/cards.ts';
import { apiAddress, apiCall } from './call.ts';
import { keepCard, keptCard } from './kept-cards.ts';
import { isProblem } from './problem.ts';
import { cardsRoot as root } from './roots.ts';

export type CardAsked = QueryOf<typeof cardEndpoints.get>;

/** A plate card, and whether it is one kept on this device because the server could not be reached (`card.asOf` says from when). */
export type CardAnswer = { readonly card: Card; readonly kept: boolean };

export const cardQuery = (asked: CardAsked) => {
  const address = apiAddress(cardEndpoints.get, { query: asked });
  return queryOptions({
    queryKey: [...root, 'one', address],
    queryFn: async ({ signal }): Promise<CardAnswer> => {
      try {
        const card = await apiCall(cardEndpoints.get, { query: asked, signal });
        keepCard(address, card);
        return { card, kept: false };
      } catch (error) {
        const card = isProblem(error, 'lost-connection', 'unavailable') ? keptCard(address) : null;
        if (card === null) throw error;
        return { card, kept: true };
      }
    },
    // What an operator cuts by must be what is approved now: asked again each time it comes into view.
    staleTime: 0,
    refetchInterval: 60_000,
  });
};
