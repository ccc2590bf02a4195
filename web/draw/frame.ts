/** Paints at most once a frame, and only when something has marked the picture dirty. */
export interface Painter {
  dirty(): void;
  stop(): void;
}

export function createPainter(
  paint: () => void,
  request: (run: () => void) => number = requestAnimationFrame,
  cancel = cancelAnimationFrame,
): Painter {
  let pending: number | null = null;
  return {
    dirty() {
      pending ??= request(() => {
        pending = null;
        paint();
      });
    },
    stop() {
      if (pending !== null) cancel(pending);
      pending = null;
    },
  };
}
