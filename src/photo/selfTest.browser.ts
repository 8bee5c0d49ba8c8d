import { readableContext, readStrips } from './canvas.browser.ts';

export type SelfTest = { readonly ok: true } | { readonly ok: false; readonly sentence: string };

/**
 * Whether pixels come back from a canvas as they went in. Some browsers add noise against fingerprinting, or give blank
 * pixels; every thickness would suffer. Run once at the start; show `sentence` where it is not ok.
 */
export async function selfTest(): Promise<SelfTest> {
  const worst = await largestReadBackError();
  if (worst === 0) return { ok: true };
  return {
    ok: false,
    sentence: `This browser alters the colours of photos that are opened here (by up to ${worst} of 255), which spoils every reading. Switch off its fingerprinting protection for this app, or use another browser.`,
  };
}

/** Largest difference in codes, 0 to 255, between a pattern and the same pattern read back. */
async function largestReadBackError(): Promise<number> {
  const side = 64;
  const pattern = readableContext(side, side).createImageData(side, side);
  // Every code in every channel, in no order that noise could follow.
  for (let i = 0; i < pattern.data.length; i++)
    pattern.data[i] = i % 4 === 3 ? 255 : (Math.imul(i + 1, 2654435761) >>> 13) & 255;
  const bitmap = await createImageBitmap(pattern, { colorSpaceConversion: 'none' });
  let worst = 0;
  for await (const { codes, firstRow } of readStrips(bitmap)) {
    const offset = firstRow * side * 4;
    for (let i = 0; i < codes.length; i++)
      worst = Math.max(worst, Math.abs(codes[i]! - pattern.data[offset + i]!));
  }
  bitmap.close();
  return worst;
}

/** Four pixels in a PNG with a Display P3 profile, and their codes. */
const P3_PNG =
  'iVBORw0KGgoAAAANSUhEUgAAAAQAAAABCAIAAAB2XpiaAAABImlDQ1BpY2MAACiRpZA/S8NQFEfPaxUx1EF0dMgidNDFDjooaK0ITqVWaOqU5p+FNoQkIjoJfgFBP4EOujoWhTo6CoJT0a8gCi5anrxGiJMg/pZ7OJfL5V7ITAEMAW0/DivrRb1m1HV+xLSigF/z/ohQ9WGWv2fUdiILeAHKe3EQg1gGJq0d0wZRBWbCmlEHcai8l/Cp4kbCl4rDamUVxA2gewn3FDcS/lTcbu2qXSoZIGc7pTU1C+Qdf2vzmxdZwecAhyYeDjplCpRoEhHQwmQ/cemv0h9EbmFuoESuCMNPUr5Nw8gJ9I+l/DiTsn8O2R7c+un80TMsdaWU16nb6MLVPGid1OUXYFyDu05ghuZAZdU1rguvFzBmwMQ9aNv/7X8Bcr9dPMQCZhUAAAAJcEhZcwAAA+gAAAPoAbV7UmsAAAAVSURBVAjXY4g+6nTKOqahocHO7SMAJIkFubqhNHAAAAAASUVORK5CYII=';
const P3_CODES = [91, 197, 66, 202, 59, 92, 128, 128, 128, 62, 70, 241];

let answer: Promise<boolean> | undefined;

/** Whether this browser hands over a profiled photo's codes unconverted when told to. Found out once. */
export function keepsCodes(): Promise<boolean> {
  answer ??= (async () => {
    const bytes = Uint8Array.from(atob(P3_PNG), (letter) => letter.charCodeAt(0));
    const bitmap = await createImageBitmap(new Blob([bytes], { type: 'image/png' }), {
      colorSpaceConversion: 'none',
    });
    // A conversion to sRGB would move these by 20 codes and more; one code is left to rounding.
    for await (const { codes } of readStrips(bitmap))
      for (let i = 0; i < P3_CODES.length; i++)
        if (Math.abs(codes[Math.floor(i / 3) * 4 + (i % 3)]! - P3_CODES[i]!) > 1) return false;
    return true;
  })();
  return answer;
}
