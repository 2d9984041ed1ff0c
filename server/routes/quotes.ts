import { createQuote, getQuote, listQuotes } from '@/shared/contracts/quotes';
import { route } from '../middleware/route';
import * as quotes from '../services/quotes';

export const quoteRoutes = [
  route(createQuote, ({ actor, body, writeOnce }) => quotes.createQuote(actor, body, writeOnce)),
  route(listQuotes, ({ actor, query }) => quotes.listQuotes(actor.desk, query)),
  route(getQuote, ({ actor, params }) => quotes.getQuote(actor.desk, params.quoteId)),
];
