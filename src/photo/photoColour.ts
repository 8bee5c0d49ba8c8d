import { D65_XY, DISPLAY_P3, SRGB } from '../colour/rgb.ts';
import type { RgbEncoding } from '../colour/types.ts';
import { readIccProfile } from './iccProfile.ts';
import { ADOBE_RGB, powerEncoding, untagged } from './knownEncodings.ts';
import type { ColourTag, SniffedPhoto } from './sniffed.ts';
import { PhotoError } from './types.ts';

export interface PhotoColour {
  readonly encoding: RgbEncoding;
  /** For the record: the profile's own description, or what stood in for one. */
  readonly profileName: string;
  readonly notices: readonly string[];
}

const INK =
  'This picture is stored in printing inks (CMYK), not in light. Export it as an RGB JPEG, or open the original.';
const HDR =
  'This picture is stored for high dynamic range screens, with a tone curve that this app does not read. Share it as an ordinary JPEG, or switch HDR off in the camera settings.';
const GREY = 'This picture has no colour (grey only): film colours cannot be read from it.';

/**
 * Which RGB encoding the code values are in. An embedded profile goes first (PNG's `cICP` before even that, as its
 * specification orders), then code points, then what the format states, then the DCF option-file mark, else sRGB.
 * @throws PhotoError for ink colours and for PQ and HLG.
 */
export function photoColour(photo: SniffedPhoto, dcfOptionFile: boolean): PhotoColour {
  if (photo.colourModel === 'cmyk') throw new PhotoError(INK);
  const named = encodingOf(photo.format === 'png', photo.colour, dcfOptionFile);
  const grey = photo.colourModel === 'grey' && !named.notices.includes(GREY);
  return grey ? { ...named, notices: [...named.notices, GREY] } : named;
}

function encodingOf(isPng: boolean, tag: ColourTag, dcfOptionFile: boolean): PhotoColour {
  if (tag.codePoints && (isPng || !tag.icc)) return byCodePoints(tag.codePoints);
  if (tag.icc) {
    const reading = readIccProfile(tag.icc);
    if (reading.kind === 'cmyk') throw new PhotoError(INK);
    return { encoding: reading.encoding, profileName: reading.description, notices: reading.notices };
  }
  if (tag.iccDamaged)
    return {
      encoding: untagged,
      profileName: 'damaged, taken as sRGB',
      notices: ['The colour profile in this photo is damaged; its colours are read as sRGB.'],
    };
  if (tag.statedSrgb) return { encoding: SRGB, profileName: 'sRGB', notices: [] };
  if (tag.gamma !== undefined) return byGamma(tag.gamma, tag.chromaticities);
  if (dcfOptionFile) return { encoding: ADOBE_RGB, profileName: 'Adobe RGB (1998)', notices: [] };
  return { encoding: untagged, profileName: 'none, taken as sRGB', notices: [] };
}

/** ITU-T H.273: primaries 1 = BT.709, 2 = not stated, 12 = P3 with D65; transfer 16 = PQ, 18 = HLG, 13 = sRGB. */
function byCodePoints({ primaries, transfer }: { primaries: number; transfer: number }): PhotoColour {
  if (transfer === 16 || transfer === 18) throw new PhotoError(HDR);
  // Still pictures marked with a video transfer (1, 6, 14, 15) are shown, and made, with sRGB's.
  const plainTransfer = [1, 2, 6, 13, 14, 15].includes(transfer);
  if (plainTransfer && (primaries === 1 || primaries === 2))
    return { encoding: SRGB, profileName: 'sRGB (code points)', notices: [] };
  if (plainTransfer && primaries === 12)
    return { encoding: DISPLAY_P3, profileName: 'Display P3 (code points)', notices: [] };
  return {
    encoding: untagged,
    profileName: `code points ${primaries}/${transfer}, taken as sRGB`,
    notices: [
      `This photo's colour space (code points ${primaries} and ${transfer}) is not one that this app knows; its colours are read as sRGB.`,
    ],
  };
}

const SRGB_GAMMA = 1 / 2.2;
const BT709 = [0.64, 0.33, 0.3, 0.6, 0.15, 0.06] as const;

function byGamma(gamma: number, chromaticities: readonly number[] | undefined): PhotoColour {
  const [wx, wy, rx, ry, gx, gy, bx, by] = chromaticities ?? [...D65_XY, ...BT709];
  const isBt709 = [rx, ry, gx, gy, bx, by].every((value, index) => Math.abs(value! - BT709[index]!) < 1e-3);
  // A gamma of 1/2.2 beside these primaries is how the PNG specification has sRGB written for old readers (11.3.2.5).
  if (isBt709 && Math.abs(gamma - SRGB_GAMMA) < 1e-3)
    return { encoding: SRGB, profileName: 'sRGB (by gAMA)', notices: [] };
  const primaries = [
    [rx!, ry!],
    [gx!, gy!],
    [bx!, by!],
  ] as const;
  const encoding = powerEncoding(1 / gamma, primaries, [wx!, wy!]);
  if (encoding) return { encoding, profileName: `gAMA ${gamma.toFixed(5)}`, notices: [] };
  return {
    encoding: untagged,
    profileName: 'gAMA or cHRM out of range, taken as sRGB',
    notices: ['This file states an impossible gamma or impossible primaries; its colours are read as sRGB.'],
  };
}
