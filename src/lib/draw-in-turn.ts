/** What is drawn in this time takes the browser several times as long to lay out and paint, before it hears the next key. */
const sliceMs = 6;

interface Drawing {
  readonly draw: () => void;
  readonly alone: boolean;
  cancelled: boolean;
}

/** Pieces of drawing, a few at a time in a task of their own, each few laid out and painted before the next. */
class Turns {
  #waiting: Drawing[] = [];
  #running = false;

  add(draw: () => void, alone: boolean): () => void {
    const drawing = { draw, alone, cancelled: false };
    this.#waiting.push(drawing);
    if (!this.#running) this.#runBehindFrame();
    return () => {
      drawing.cancelled = true;
    };
  }

  // A page that is not shown has no frames: there the pieces wait until it is.
  #runBehindFrame(): void {
    this.#running = true;
    requestAnimationFrame(() => setTimeout(() => this.#run(), 0));
  }

  #run(): void {
    const began = performance.now();
    this.#waiting = this.#waiting.filter(({ cancelled }) => !cancelled);
    let next = this.#waiting.shift();
    try {
      while (next !== undefined) {
        if (!next.cancelled) next.draw();
        const isOver = next.alone || this.#waiting[0]?.alone === true || performance.now() - began >= sliceMs;
        next = isOver ? undefined : this.#waiting.shift();
      }
    } finally {
      // Also when a piece threw: those behind it are drawn.
      this.#running = false;
      if (this.#waiting.length > 0) this.#runBehindFrame();
    }
  }
}

// One queue for the page: two would each take their slice of the same frame.
const turns = new Turns();

/** Draws a small piece soon, and never many in one frame. Answers how to take it back. */
export function drawInTurn(draw: () => void): () => void {
  return turns.add(draw, false);
}

/** Draws what is enough for a frame of its own. Answers how to take it back. */
export function drawAlone(draw: () => void): () => void {
  return turns.add(draw, true);
}
