/** A repeatable stream of numbers: the same seed and name give the same throws for ever. */
export type Dice = {
  /** Evenly in [0, 1). */
  readonly next: () => number;
  /** Evenly in [low, high). */
  readonly between: (low: number, high: number) => number;
  /** A whole number from low to high, both included. */
  readonly whole: (low: number, high: number) => number;
  readonly chance: (probability: number) => boolean;
  readonly pick: <Item>(items: readonly Item[]) => Item;
  readonly shuffle: <Item>(items: readonly Item[]) => Item[];
  /** Normally distributed with mean 0 and deviation 1. */
  readonly normal: () => number;
};

/** Each part of the demo throws its own named dice, so that a change in one leaves the others alone. */
export function createDice(seed: number, name: string): Dice {
  let state = mixText(seed >>> 0, name) || 0x2545f491;

  function next(): number {
    state ^= state << 13;
    state ^= state >>> 17;
    state ^= state << 5;
    return (Math.imul(state, 0x9e3779b1) >>> 0) / 0x1_0000_0000;
  }
  function between(low: number, high: number): number {
    return low + (high - low) * next();
  }
  function whole(low: number, high: number): number {
    return low + Math.floor(next() * (high - low + 1));
  }
  function pick<Item>(items: readonly Item[]): Item {
    const item = items[Math.floor(next() * items.length)];
    if (item === undefined) {
      throw new RangeError(`The demo has nothing to pick from for "${name}".`);
    }
    return item;
  }
  function shuffle<Item>(items: readonly Item[]): Item[] {
    return items
      .map((item) => ({ item, key: next() }))
      .sort((a, b) => a.key - b.key)
      .map(({ item }) => item);
  }
  function normal(): number {
    const radius = Math.sqrt(-2 * Math.log(1 - next()));
    return radius * Math.cos(2 * Math.PI * next());
  }
  return { next, between, whole, chance: (p) => next() < p, pick, shuffle, normal };
}

function mixText(seed: number, text: string): number {
  let mixed = seed ^ 0x51ed270b;
  for (const letter of text) {
    mixed = Math.imul(mixed ^ (letter.codePointAt(0) ?? 0), 0x01000193);
    mixed ^= mixed >>> 15;
  }
  return mixed;
}
