import { randomBytes } from 'node:crypto';
import { crc32, deflateSync } from 'node:zlib';
import sharp, { type Sharp } from 'sharp';

/** Files as people send them, and as they should not. */

/** Red, green / blue, white quarters, 600 × 400 as stored. */
export function quarters(): Sharp {
  const quarter = (background: string) => ({
    create: { width: 300, height: 200, channels: 3 as const, background },
  });
  return sharp({ create: { width: 600, height: 400, channels: 3, background: 'white' } }).composite([
    { input: quarter('red'), left: 0, top: 0 },
    { input: quarter('lime'), left: 300, top: 0 },
    { input: quarter('blue'), left: 0, top: 200 },
  ]);
}

/** Words that a phone leaves in its photos. */
export const PHONE_DESCRIPTION = 'Taken behind the house';

const PHONE_EXIF = {
  IFD0: { ImageDescription: PHONE_DESCRIPTION },
  IFD3: {
    GPSLatitudeRef: 'N',
    GPSLatitude: '40/1 26/1 46/1',
    GPSLongitudeRef: 'W',
    GPSLongitude: '79/1 58/1 56/1',
  },
};

/** A photo as a phone writes it: held sideways, with the place where it was taken. */
export const phonePhoto = (orientation = 6): Promise<Buffer> =>
  quarters().withExif(PHONE_EXIF).withMetadata({ orientation }).jpeg({ quality: 95 }).toBuffer();

/** A photo of many bytes: noise does not compress. */
export function noisePhoto(width: number, height: number): Promise<Buffer> {
  return sharp(randomBytes(width * height * 3), { raw: { width, height, channels: 3 } })
    .jpeg({ quality: 95 })
    .toBuffer();
}

/** A PNG of one colour, written by hand: a few kilobytes that unpack to width × height pixels. */
export function flatPng(width: number, height: number): Buffer {
  const header = Buffer.alloc(13);
  header.writeUInt32BE(width, 0);
  header.writeUInt32BE(height, 4);
  header.set([8, 2, 0, 0, 0], 8);
  // Rows for one megabyte are enough: what follows is never reached when the size is refused.
  const rows = Math.min(height, Math.ceil(1e6 / (width * 3)));
  const pixels = deflateSync(Buffer.alloc(rows * (width * 3 + 1)), { level: 9 });
  return Buffer.concat([
    Buffer.from([0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a]),
    chunk('IHDR', header),
    chunk('IDAT', pixels),
    chunk('IEND', Buffer.alloc(0)),
  ]);
}

function chunk(type: string, data: Buffer): Buffer {
  const body = Buffer.concat([Buffer.from(type, 'latin1'), data]);
  const framed = Buffer.alloc(body.length + 8);
  framed.writeUInt32BE(data.length, 0);
  body.copy(framed, 4);
  framed.writeUInt32BE(crc32(body), body.length + 4);
  return framed;
}

/** A PDF of that many pages, each of the size in points, with a line from corner to corner. */
export function pdf(pages: number, widthPoints = 792, heightPoints = 612, trailer = ''): Buffer {
  const objects: string[] = [];
  const kids = Array.from({ length: pages }, (_, i) => `${3 + 2 * i} 0 R`).join(' ');
  objects.push('<< /Type /Catalog /Pages 2 0 R >>');
  objects.push(`<< /Type /Pages /Kids [${kids}] /Count ${pages} >>`);
  for (let i = 0; i < pages; i += 1) {
    const drawing = `0 0 m ${widthPoints} ${heightPoints} l 3 w S`;
    objects.push(
      `<< /Type /Page /Parent 2 0 R /MediaBox [0 0 ${widthPoints} ${heightPoints}] /Contents ${4 + 2 * i} 0 R >>`,
      `<< /Length ${drawing.length} >>\nstream\n${drawing}\nendstream`,
    );
  }
  let text = '%PDF-1.4\n';
  const offsets = objects.map((object, i) => {
    const offset = text.length;
    text += `${i + 1} 0 obj\n${object}\nendobj\n`;
    return offset;
  });
  const start = text.length;
  text += `xref\n0 ${objects.length + 1}\n0000000000 65535 f \n`;
  for (const offset of offsets) text += `${String(offset).padStart(10, '0')} 00000 n \n`;
  text += `trailer\n<< /Size ${objects.length + 1} /Root 1 0 R ${trailer} >>\nstartxref\n${start}\n%%EOF\n`;
  return Buffer.from(text, 'latin1');
}

/** A PDF that asks for a password: its check values fit no password that anybody knows. */
export function lockedPdf(): Buffer {
  const check = 'a5'.repeat(32);
  return pdf(
    1,
    792,
    612,
    `/ID [<${'00'.repeat(16)}> <${'00'.repeat(16)}>] /Encrypt << /Filter /Standard /V 1 /R 2 /P -44 /O <${check}> /U <${check}> >>`,
  );
}

/** The first bytes of a HEIC photo. */
export const heic = (): Buffer =>
  Buffer.concat([
    Buffer.from([0, 0, 0, 24]),
    Buffer.from('ftypheic\0\0\0\0mif1heic', 'latin1'),
    Buffer.alloc(64),
  ]);

export const svg = (): Buffer =>
  Buffer.from('<svg xmlns="http://www.w3.org/2000/svg"><script>alert(1)</script></svg>');

export const gif = (): Buffer =>
  Buffer.from('R0lGODlhAQABAIAAAAAAAP///yH5BAEAAAAALAAAAAABAAEAAAIBRAA7', 'base64');

export const zip = (): Buffer =>
  Buffer.concat([Buffer.from('PK\x03\x04\x14\0\0\0\0\0', 'latin1'), Buffer.alloc(40)]);

export const executable = (): Buffer => Buffer.concat([Buffer.from('MZ', 'latin1'), Buffer.alloc(200)]);
