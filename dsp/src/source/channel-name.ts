/** Names a channel as records do: left, right, then ch3 …; `index` counts from 0. */
export function channelName(index: number): string {
  return ['left', 'right'][index] ?? `ch${index + 1}`;
}
