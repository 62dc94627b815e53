import { fitsBounds } from './picture-bounds';

const isFrame = (marker: number): boolean => marker >= 0xc0 && marker <= 0xcf && ![0xc4, 0xc8, 0xcc].includes(marker);
const isRestart = (marker: number): boolean => marker >= 0xd0 && marker <= 0xd7;

/** The first marker after the coded data of a scan: data escapes 0xff, and restart markers belong to it (ITU-T T.81, B.1.1.5). */
function afterScan(content: Buffer, from: number): number {
  let at = content.indexOf(0xff, from);
  while (at >= 0 && at + 1 < content.length) {
    const next = content[at + 1] ?? 0;
    if (next !== 0 && next !== 0xff && !isRestart(next)) return at;
    at = content.indexOf(0xff, at + (next === 0xff ? 1 : 2));
  }
  return content.length;
}

/** Where the picture that begins at `start` ends; null when it is not whole (ITU-T T.81, B.2). */
function endOfPicture(content: Buffer, start: number): number | null {
  if (content[start] !== 0xff || content[start + 1] !== 0xd8) return null;
  let at = start + 2;
  let framed = false;
  let scanned = false;
  while (at + 2 <= content.length) {
    const marker = content[at + 1] ?? 0;
    if (content[at] !== 0xff) return null;
    if (marker === 0xff) at += 1;
    else if (marker === 0xd9) return framed && scanned ? at + 2 : null;
    else {
      if (at + 4 > content.length) return null;
      const length = content.readUInt16BE(at + 2);
      if (length < 2 || at + 2 + length > content.length) return null;
      if (isFrame(marker)) {
        if (length < 8 || framed || !fitsBounds(content.readUInt16BE(at + 7), content.readUInt16BE(at + 5))) return null;
        framed = true;
      }
      at += 2 + length;
      if (marker === 0xda) {
        if (!framed) return null;
        scanned = true;
        at = afterScan(content, at);
      }
    }
  }
  return null;
}

/** Cameras put further pictures behind the first (a preview, a map of brightness). More than a handful is no photograph. */
const picturesMost = 8;

/** JPEG from start to end, and nothing after it but further whole pictures, as cameras add them. */
export function isWholeJpeg(content: Buffer): boolean {
  let at = 0;
  for (let count = 0; count < picturesMost; count += 1) {
    const end = endOfPicture(content, at);
    if (end === null) return false;
    if (end === content.length) return true;
    at = end;
  }
  return false;
}
