import { ascii, type ByteRange, slice, u16be, u32be } from './bytes.ts';
import {
  type Box,
  childrenOf,
  itemExtents,
  itemOfType,
  itemProperties,
  listBoxes,
  primaryItem,
} from './heifBoxes.ts';
import type { ColourTag, SniffedPhoto } from './sniffed.ts';

/**
 * AVIF and HEIC (ISO/IEC 23008-12; AV1 Image File Format 1.1.0): size and turn of the primary item, its `colr`, and the
 * Exif item. The turn (`irot`, `imir`) is carried out by every decoder, so `width` and `height` are given after it, and
 * the EXIF orientation is not to be applied on top (23008-12, A.2.1).
 */
export function sniffHeif(bytes: Uint8Array, format: 'avif' | 'heic'): SniffedPhoto {
  const { boxes, whole } = listBoxes(bytes, { offset: 0, length: bytes.length });
  const meta = boxes.find(({ type }) => type === 'meta');
  const inMeta = meta ? childrenOf(bytes, meta, 4) : [];
  const find = (type: string) => inMeta.find((box) => box.type === type);
  const [pitm, iinf, iloc, iprp] = [find('pitm'), find('iinf'), find('iloc'), find('iprp')];
  const inIprp = iprp ? childrenOf(bytes, iprp, 0) : [];
  const ipco = inIprp.find(({ type }) => type === 'ipco');
  const ipma = inIprp.find(({ type }) => type === 'ipma');
  const all = ipco ? childrenOf(bytes, ipco, 0) : [];
  const primary = pitm ? primaryItem(bytes, pitm) : 0;
  const own = ipma ? itemProperties(bytes, ipma, all, primary) : [];

  const ispe = own.find(({ type }) => type === 'ispe');
  let width = ispe ? u32be(bytes, ispe.offset + 4) : 0;
  let height = ispe ? u32be(bytes, ispe.offset + 8) : 0;
  // A clean aperture crops (ISO/IEC 14496-12, 12.1.4.2: width and height as fractions), before the picture is turned.
  const clap = own.find(({ type }) => type === 'clap');
  if (clap) {
    width = Math.round(u32be(bytes, clap.offset) / u32be(bytes, clap.offset + 4)) || 0;
    height = Math.round(u32be(bytes, clap.offset + 8) / u32be(bytes, clap.offset + 12)) || 0;
  }
  const irot = own.find(({ type }) => type === 'irot');
  if (irot && ((bytes[irot.offset] ?? 0) & 1) === 1) [width, height] = [height, width];
  const pixi = own.find(({ type }) => type === 'pixi');
  const channels = pixi ? bytes[pixi.offset + 4] : undefined;

  const extents = iloc ? itemExtents(bytes, iloc, find('idat')) : new Map<number, ByteRange[]>();
  const exifItem = iinf ? itemOfType(bytes, iinf, 'Exif') : undefined;
  const exif = exifItem === undefined ? undefined : exifBlock(bytes, extents.get(exifItem)?.[0]);
  const reachesEnd = (extents.get(primary) ?? []).every(
    ({ offset, length }) => offset + length <= bytes.length,
  );
  return {
    format,
    mimeType: format === 'avif' ? 'image/avif' : 'image/heic',
    width,
    height,
    bitDepth: (pixi ? bytes[pixi.offset + 5] : undefined) ?? 8,
    colourModel: channels === 1 ? 'grey' : 'rgb',
    hasAlpha: all.some((box) => box.type === 'auxC' && isAlpha(ascii(bytes, box.offset + 4, 64))),
    colour: colourOf(bytes, own.some(isColr) ? own : all),
    ...(exif && { exif }),
    complete: whole && width > 0 && reachesEnd,
  };
}

/** Names of the alpha plane: AV1 Image File Format, 4.1, and ISO/IEC 23008-12, table B.1. */
const isAlpha = (name: string) =>
  name.startsWith('urn:mpeg:mpegB:cicp:systems:auxiliary:alpha') ||
  name.startsWith('urn:mpeg:hevc:2015:auxid:1');

const isColr = ({ type }: Box) => type === 'colr';

function colourOf(bytes: Uint8Array, properties: readonly Box[]): ColourTag {
  let tag: ColourTag = {};
  for (const box of properties.filter(isColr)) {
    const kind = ascii(bytes, box.offset, 4);
    if (kind === 'nclx' && !tag.codePoints)
      tag = {
        ...tag,
        codePoints: { primaries: u16be(bytes, box.offset + 4), transfer: u16be(bytes, box.offset + 6) },
      };
    else if ((kind === 'prof' || kind === 'rICC') && !tag.icc)
      tag = { ...tag, icc: slice(bytes, { offset: box.offset + 4, length: box.length - 4 }) };
  }
  return tag;
}

/** An Exif item starts with the distance from its fifth byte to the TIFF header (23008-12, A.2.1). */
function exifBlock(bytes: Uint8Array, extent: ByteRange | undefined): ByteRange | undefined {
  if (!extent || !(extent.offset + 4 <= bytes.length)) return undefined;
  const skip = 4 + u32be(bytes, extent.offset);
  return skip < extent.length ? { offset: extent.offset + skip, length: extent.length - skip } : undefined;
}
