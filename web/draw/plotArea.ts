/** Where a figure's frame stands inside its box, and its ticks. Sheet pixels. */

export interface PlotArea {
  readonly width: number;
  readonly height: number;
  readonly left: number;
  readonly right: number;
  readonly top: number;
  readonly bottom: number;
}

export interface Tick {
  /** Pixel along its axis. */
  readonly at: number;
  /** Null for a grid line without a number. */
  readonly words: string | null;
}

export interface Margins {
  readonly left: number;
  readonly right: number;
  readonly top: number;
  readonly bottom: number;
}

export function plotArea(width: number, height: number, margins: Margins): PlotArea {
  return { width, height, left: margins.left, right: width - margins.right, top: margins.top, bottom: height - margins.bottom };
}
