/** Things that happen at a moment, to be played in order. */
import type { DemoClock } from './demo-world.ts';

export type DemoEvent = { at: Date; run: () => Promise<unknown> };

/** Plays events in the order of their moments; equal moments keep the order they came in. */
export async function play(clock: DemoClock, events: readonly DemoEvent[]): Promise<void> {
  const inOrder = events
    .map((event, index) => ({ event, index }))
    .sort((a, b) => a.event.at.getTime() - b.event.at.getTime() || a.index - b.index);
  for (const { event } of inOrder) {
    clock.moveTo(event.at);
    await event.run();
  }
}
