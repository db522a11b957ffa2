import type { Context } from '../../context';
import { originOf } from '../../http/origin';
import type { Routes } from '../../http/routes';
import { readFeed } from './service';

/** A private address: whoever has it reads the calls of one person, and nothing else. Reading changes nothing. */
export function calendarRoutes(routes: Routes, context: Context): void {
  routes.anyone('get', '/calendar/:token.ics', {
    run: ({ params, request }) => readFeed(context, params.token, `${originOf(request)}${request.path}`),
    send: (response, feed) => {
      response.set({
        'Content-Type': 'text/calendar; charset=utf-8',
        'Cache-Control': 'private, no-cache',
        ETag: feed.tag,
        'Last-Modified': feed.changedAt.toUTCString(),
      });
      // Express answers 304 where If-None-Match or If-Modified-Since says that nothing is new.
      response.send(feed.text);
    },
  });
}
