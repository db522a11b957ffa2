import type { Context } from '../../context';
import { hasNewest } from '../../http/conditional';
import { originOf } from '../../http/origin';
import type { Routes } from '../../http/routes';
import { readFeed } from './service';

/** A private address: whoever has it reads the calls of one person, and nothing else. Reading changes nothing. */
export function calendarRoutes(routes: Routes, context: Context): void {
  routes.anyone('get', '/calendar/:token.ics', {
    run: ({ params, request }) => readFeed(context, params.token, `${originOf(request)}${request.path}`),
    send: (response, feed) => {
      response.set({ 'Cache-Control': 'private, no-cache', ETag: feed.tag, 'Last-Modified': feed.changedAt.toUTCString() });
      if (hasNewest(response.req, feed.tag, feed.changedAt)) response.status(304).end();
      else response.type('text/calendar; charset=utf-8').send(feed.text);
    },
  });
}
