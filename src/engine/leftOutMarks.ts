/** Marks of pixels that are not read, and why. */
export const LEFT_OUT = {
  no: 0,
  outsideRegion: 1,
  noColour: 2,
  tooSlanted: 3,
  aboveHorizon: 4,
  texture: 5,
} as const;
