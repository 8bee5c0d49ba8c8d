/** Where the photo lies on the stage: screen = photo * scale + offset, all in CSS pixels. Pure geometry. */
export interface View {
  readonly scale: number;
  readonly x: number;
  readonly y: number;
}

export interface Size {
  readonly width: number;
  readonly height: number;
}

/** Whole photo on the stage, centred. */
export function fitted(photo: Size, stage: Size): View {
  const scale = Math.min(stage.width / photo.width, stage.height / photo.height);
  return { scale, x: (stage.width - photo.width * scale) / 2, y: (stage.height - photo.height * scale) / 2 };
}

export function toPhoto(view: View, x: number, y: number): readonly [number, number] {
  return [(x - view.x) / view.scale, (y - view.y) / view.scale];
}

export function toScreen(view: View, x: number, y: number): readonly [number, number] {
  return [x * view.scale + view.x, y * view.scale + view.y];
}

/** Zooms by `factor` so that the photo's point under (x, y) stays there; from the fitted view up to 16 screen pixels a pixel. */
export function zoomed(view: View, factor: number, x: number, y: number, photo: Size, stage: Size): View {
  const least = fitted(photo, stage).scale;
  const scale = Math.min(16, Math.max(least, view.scale * factor));
  const ratio = scale / view.scale;
  return held({ scale, x: x - (x - view.x) * ratio, y: y - (y - view.y) * ratio }, photo, stage);
}

export function panned(view: View, dx: number, dy: number, photo: Size, stage: Size): View {
  return held({ scale: view.scale, x: view.x + dx, y: view.y + dy }, photo, stage);
}

/** Keeps the photo on the stage: centred where it is smaller, covering where it is larger. */
export function held(view: View, photo: Size, stage: Size): View {
  const hold = (offset: number, size: number, room: number) =>
    size <= room ? (room - size) / 2 : Math.min(0, Math.max(room - size, offset));
  return {
    scale: view.scale,
    x: hold(view.x, photo.width * view.scale, stage.width),
    y: hold(view.y, photo.height * view.scale, stage.height),
  };
}

/** The same part of the photo in the middle, at the same scale, after the stage changed its size. */
export function recentred(view: View, before: Size, after: Size, photo: Size): View {
  const least = fitted(photo, after).scale;
  const dx = (after.width - before.width) / 2;
  const dy = (after.height - before.height) / 2;
  if (view.scale < least) return fitted(photo, after);
  return held({ scale: view.scale, x: view.x + dx, y: view.y + dy }, photo, after);
}
