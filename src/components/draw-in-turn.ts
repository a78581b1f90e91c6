/** Longer than this on the main thread and a key that is pressed meanwhile is felt to stick. */
const sliceMs = 12;

interface Drawing {
  readonly draw: () => void;
  cancelled: boolean;
}

/** Small pieces of drawing, done a few at a time with the browser's own work between them. */
class Turns {
  readonly #waiting: Drawing[] = [];
  #running = false;

  add(draw: () => void): () => void {
    const drawing = { draw, cancelled: false };
    this.#waiting.push(drawing);
    if (!this.#running) {
      this.#running = true;
      setTimeout(() => this.#run(), 0);
    }
    return () => {
      drawing.cancelled = true;
    };
  }

  #run(): void {
    const began = performance.now();
    while (performance.now() - began < sliceMs) {
      const next = this.#waiting.shift();
      if (next === undefined) {
        this.#running = false;
        return;
      }
      if (!next.cancelled) next.draw();
    }
    setTimeout(() => this.#run(), 0);
  }
}

// One queue for the page: two would each take their slice of the same frame.
const turns = new Turns();

/** Draws soon, and never many in one go. Answers how to take it back. */
export function drawInTurn(draw: () => void): () => void {
  return turns.add(draw);
}
