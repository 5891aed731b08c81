/**
 * Waves under way: at which moment which amplitudes reach which place. Times are integers, so that waves that arrive
 * together are one arrival whatever ways they came; the earliest is taken first.
 *
 * Method    binary heap over arrivals, found again by time and place
 */
export class Arrivals {
  private readonly slots = new Map<number, number>();
  private readonly heap: number[] = [];
  private readonly times: number[] = [];
  private readonly places: number[] = [];
  private amplitudes: Float64Array;

  /** `width` amplitudes arrive together; times stay below 2^51. */
  constructor(private readonly width: number) {
    this.amplitudes = new Float64Array(64 * width);
  }

  add(time: number, place: 0 | 1 | 2 | 3, channel: number, amplitude: number): void {
    const key = 4 * time + place;
    let slot = this.slots.get(key);
    if (slot === undefined) {
      slot = this.times.length;
      this.slots.set(key, slot);
      this.times.push(time);
      this.places.push(place);
      if (this.amplitudes.length < (slot + 1) * this.width) this.amplitudes = grown(this.amplitudes);
      this.raise(slot);
    }
    this.amplitudes[slot * this.width + channel] += amplitude;
  }

  /** The earliest arrival, its amplitudes copied into `into`; null when no wave is under way. */
  next(into: Float64Array): { readonly time: number; readonly place: number } | null {
    if (this.heap.length === 0) return null;
    const slot = this.heap[0];
    const time = this.times[slot];
    const place = this.places[slot];
    this.slots.delete(4 * time + place);
    for (let i = 0; i < this.width; i += 1) into[i] = this.amplitudes[slot * this.width + i];
    this.sink();
    return { time, place };
  }

  private raise(slot: number): void {
    const { heap, times } = this;
    let at = heap.length;
    heap.push(slot);
    while (0 < at) {
      const above = (at - 1) >> 1;
      if (times[heap[above]] <= times[slot]) break;
      heap[at] = heap[above];
      at = above;
    }
    heap[at] = slot;
  }

  private sink(): void {
    const { heap, times } = this;
    const slot = heap.pop()!;
    if (heap.length === 0) return;
    let at = 0;
    for (;;) {
      let below = 2 * at + 1;
      if (heap.length <= below) break;
      if (below + 1 < heap.length && times[heap[below + 1]] < times[heap[below]]) below += 1;
      if (times[slot] <= times[heap[below]]) break;
      heap[at] = heap[below];
      at = below;
    }
    heap[at] = slot;
  }
}

function grown(values: Float64Array): Float64Array {
  const larger = new Float64Array(2 * values.length);
  larger.set(values);
  return larger;
}
