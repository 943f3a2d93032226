import { transfer } from 'comlink';
import type { InputFeed } from '../audio/audio-rig';

/** Hands a feed over to the worker: this thread can't read it afterwards, nor hold it up. */
export function transferFeed(feed: InputFeed): InputFeed {
  return feed.kind === 'track' ? transfer(feed, [feed.readable]) : transfer(feed, [feed.port]);
}
