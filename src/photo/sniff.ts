import { ascii, u32be } from './bytes.ts';
import type { PhotoFormat, SniffedPhoto } from './sniffed.ts';
import { sniffHeif } from './sniffHeif.ts';
import { sniffJpeg } from './sniffJpeg.ts';
import { sniffPng } from './sniffPng.ts';
import { sniffWebp } from './sniffWebp.ts';

/** File type by its first bytes; the name and the type that the system claims are not asked. */
export function formatOf(bytes: Uint8Array): PhotoFormat {
  const first = u32be(bytes, 0);
  if (first >>> 8 === 0xffd8ff) return 'jpeg';
  if (first === 0x89504e47 && u32be(bytes, 4) === 0x0d0a1a0a) return 'png';
  if (ascii(bytes, 0, 4) === 'RIFF' && ascii(bytes, 8, 4) === 'WEBP') return 'webp';
  if (ascii(bytes, 4, 4) === 'ftyp') return heifBrand(bytes);
  if (first === 0x49492a00 || first === 0x4d4d002a || first === 0x49492b00 || first === 0x4d4d002b)
    return 'tiff';
  if (ascii(bytes, 0, 4) === 'GIF8') return 'gif';
  return 'unknown';
}

const HEIC_BRANDS = ['heic', 'heix', 'heim', 'heis', 'hevc', 'hevx', 'mif1', 'msf1'];

function heifBrand(bytes: Uint8Array): PhotoFormat {
  const end = Math.min(u32be(bytes, 0), 256, bytes.length);
  const brands: string[] = [];
  for (let at = 8; at + 4 <= end; at += 4) if (at !== 12) brands.push(ascii(bytes, at, 4));
  if (brands.includes('avif') || brands.includes('avis')) return 'avif';
  return brands.some((brand) => HEIC_BRANDS.includes(brand)) ? 'heic' : 'unknown';
}

/** Size, colour tags, EXIF place and soundness of a photo, from its structure alone: nothing is decoded. Never throws. */
export function sniff(bytes: Uint8Array): SniffedPhoto {
  const format = formatOf(bytes);
  switch (format) {
    case 'jpeg':
      return sniffJpeg(bytes);
    case 'png':
      return sniffPng(bytes);
    case 'webp':
      return sniffWebp(bytes);
    case 'avif':
    case 'heic':
      return sniffHeif(bytes, format);
    default:
      return {
        format,
        mimeType:
          format === 'tiff' ? 'image/tiff' : format === 'gif' ? 'image/gif' : 'application/octet-stream',
        width: 0,
        height: 0,
        bitDepth: 0,
        colourModel: 'unknown',
        hasAlpha: false,
        colour: {},
        complete: true,
      };
  }
}
