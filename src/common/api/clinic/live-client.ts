import { Injectable } from '@angular/core';
import { Observable, share } from 'rxjs';
import { liveEvent, type LiveEvent } from '../../../../shared/contracts/this-morning';

/** What reaches an open screen: a change somewhere, or the stream having (re)opened, when everything is fetched again. */
export type LiveNews = LiveEvent | { readonly topic: 'opened'; readonly refId: null };

/** One stream for the whole window; the browser reconnects by itself. */
@Injectable({ providedIn: 'root' })
export class LiveClient {
  readonly news: Observable<LiveNews> = new Observable<LiveNews>((subscriber) => {
    const source = new EventSource('/api/clinic/live');
    source.onopen = () => subscriber.next({ topic: 'opened', refId: null });
    source.onmessage = (message: MessageEvent<string>) => {
      const event = liveEvent.safeParse(JSON.parse(message.data));
      if (event.success) subscriber.next(event.data);
    };
    return () => source.close();
  }).pipe(share());
}
