import type { paths } from './api_schema';

/** The event streams of the API: what each path sends, by the names of its events. */
type Streams = {
  [P in keyof paths]: paths[P] extends {
    get: { responses: { 200: { content: { 'text/event-stream': (infer E)[] } } } };
  }
    ? E
    : never;
};
type StreamPath = { [P in keyof Streams]: Streams[P] extends never ? never : P }[keyof Streams];
type Event<P extends StreamPath> = Extract<Streams[P], { event: string; data: unknown }>;
type Heard<P extends StreamPath> = {
  [N in Event<P>['event']]: (data: Extract<Event<P>, { event: N }>['data']) => void;
};

/**
 * listen watches a stream until its last event; what it returns ends it sooner. The stream is closed on the last event
 * here, since a browser asks again for one that ends by itself.
 */
export function listen<P extends StreamPath>(
  _path: P,
  url: string,
  on: Heard<P>,
  last: keyof Heard<P> & string,
  lost: () => void,
): () => void {
  const stream = new EventSource(url);
  for (const [name, told] of Object.entries(on) as [string, (data: unknown) => void][]) {
    stream.addEventListener(name, (e) => {
      if (name === last) stream.close();
      told(JSON.parse((e as MessageEvent<string>).data));
    });
  }
  stream.onerror = () => {
    stream.close();
    lost();
  };
  return () => stream.close();
}
