/** The sizes of one stage, in CSS pixels, all from the rings' radius. */
export interface StageSizes {
  readonly ringRadius: number;
  readonly polariserRadius: number;
  readonly glyphRadius: number;
  /** Of the output ellipse's long axis; its disc is 1.3 times that. */
  readonly outputRadius: number;
  /** Height of the drawing, the beam in its middle. */
  readonly zoneHeight: number;
  /** What the beam line takes at least; a narrower page scrolls along it. */
  readonly leastWidth: number;
}

export const RING_RADIUS = { most: 80, least: 60 } as const;

/** The source's tick with its wavelength, and the tail of the beam behind the output. */
const SOURCE_WIDTH = 62;
const TAIL_WIDTH = 24;
const GAP = 14;

function stageSizes(ringRadius: number, plateCount: number): StageSizes {
  const polariserRadius = ringRadius * 0.475;
  const glyphRadius = ringRadius * 0.31;
  const outputRadius = ringRadius * 0.7;
  const outputWidth = Math.max(outputRadius * 2.6, 170);
  const plateWidth = Math.max(2 * ringRadius, 150);
  const stateWidth = 2 * glyphRadius + 16;
  const items = 2 * plateCount + 3;
  return {
    ringRadius,
    polariserRadius,
    glyphRadius,
    outputRadius,
    zoneHeight: Math.round(2 * ringRadius + 14),
    leastWidth:
      SOURCE_WIDTH +
      Math.max(2 * polariserRadius, 96) +
      plateCount * (plateWidth + stateWidth) +
      outputWidth +
      TAIL_WIDTH +
      (items - 1) * GAP,
  };
}

/** The largest rings that fit: 80, shrinking to 60; below that the stage scrolls along the beam. */
export function fittingStage(width: number, plateCount: number): StageSizes {
  for (let radius: number = RING_RADIUS.most; radius > RING_RADIUS.least; radius -= 2) {
    const sizes = stageSizes(radius, plateCount);
    if (sizes.leastWidth <= width) return sizes;
  }
  return stageSizes(RING_RADIUS.least, plateCount);
}

/** The readout's column beside the beam line, with its gap. */
const READOUT_WIDTH = 220;
/** On a narrower page the readout always stands under the beam line. */
const BESIDE_FROM = 940;

interface StageArrangement {
  readonly sizes: StageSizes;
  readonly readoutBeside: boolean;
  readonly scrolls: boolean;
}

/** The readout stands beside the beam line as long as that doesn't make it scroll. */
export function arrangeStage(width: number, plateCount: number, hasReadout: boolean): StageArrangement {
  const beside = width - READOUT_WIDTH;
  const smallest = stageSizes(RING_RADIUS.least, plateCount).leastWidth;
  const readoutBeside = hasReadout && width >= BESIDE_FROM && smallest <= beside;
  const lineWidth = readoutBeside ? beside : width;
  return { sizes: fittingStage(lineWidth, plateCount), readoutBeside, scrolls: smallest > lineWidth };
}
