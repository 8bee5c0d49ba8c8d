/** Pixels a unit of the drawing: sharp on phones and in print. */
const SCALE = 2;

/**
 * Draws an SVG of our own as PNG.
 * @throws Error with a sentence where this browser does not draw it
 */
export async function svgToPng(svg: string): Promise<Blob> {
  const url = URL.createObjectURL(new Blob([svg], { type: 'image/svg+xml' }));
  try {
    const image = new Image();
    image.src = url;
    await image.decode();
    const canvas = document.createElement('canvas');
    canvas.width = SCALE * image.naturalWidth;
    canvas.height = SCALE * image.naturalHeight;
    canvas.getContext('2d')?.drawImage(image, 0, 0, canvas.width, canvas.height);
    const blob = await new Promise<Blob | null>((resolve) => canvas.toBlob(resolve, 'image/png'));
    if (blob) return blob;
  } catch {
    // The sentence below says what to do.
  } finally {
    URL.revokeObjectURL(url);
  }
  throw new Error('This browser could not draw the chart as PNG; take the SVG instead.');
}
