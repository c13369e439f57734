/**
 * The ustar archive format (POSIX.1-1988, interchange format): a header of 512 bytes a file, its content
 * padded to 512 bytes, and two empty blocks at the end.
 */
const BLOCK = 512;
const NAME = 100;
const PREFIX = 155;
/** Eleven octal digits. */
const MOST_BYTES = 8 ** 11 - 1;

export interface TarFile {
  readonly name: string;
  /** Bytes; must be what the content then yields. */
  readonly size: number;
  content(): AsyncIterable<Buffer>;
}

/** Streams the files as one archive. @throws when a file does not yield the bytes that it announced */
export async function* tar(files: AsyncIterable<TarFile>, modified: Date): AsyncGenerator<Buffer> {
  for await (const file of files) {
    yield tarHeader(file.name, file.size, modified);
    let bytes = 0;
    for await (const part of file.content()) {
      bytes += part.length;
      yield part;
    }
    if (bytes !== file.size)
      throw new Error(`A file of ${file.size} bytes yielded ${bytes}; the archive would be spoilt.`);
    yield Buffer.alloc((BLOCK - (bytes % BLOCK)) % BLOCK);
  }
  yield Buffer.alloc(2 * BLOCK);
}

function tarHeader(path: string, size: number, modified: Date): Buffer {
  if (size > MOST_BYTES) throw new Error(`A file of ${size} bytes is too large for this archive format.`);
  const { name, prefix } = splitPath(path);
  const header = Buffer.alloc(BLOCK);
  const octal = (value: number, at: number, digits: number) =>
    header.write(`${value.toString(8).padStart(digits, '0')}\0`, at, 'latin1');
  header.write(name, 0, 'utf8');
  octal(0o644, 100, 7);
  octal(0, 108, 7);
  octal(0, 116, 7);
  octal(size, 124, 11);
  octal(Math.floor(modified.getTime() / 1000), 136, 11);
  header.fill(' ', 148, 156);
  header.write('0', 156, 'latin1');
  header.write('ustar\u000000', 257, 'latin1');
  header.write(prefix, 345, 'utf8');
  const sum = header.reduce((total, byte) => total + byte, 0);
  header.write(`${sum.toString(8).padStart(6, '0')}\0 `, 148, 'latin1');
  return header;
}

/** A long path is cut at a slash into the two fields that there are for it. */
function splitPath(path: string): { name: string; prefix: string } {
  if (Buffer.byteLength(path) <= NAME) return { name: path, prefix: '' };
  for (let at = path.indexOf('/'); at !== -1; at = path.indexOf('/', at + 1)) {
    const [prefix, name] = [path.slice(0, at), path.slice(at + 1)];
    if (name !== '' && Buffer.byteLength(name) <= NAME && Buffer.byteLength(prefix) <= PREFIX)
      return { name, prefix };
  }
  throw new Error(`The path ${path} is too long for this archive format.`);
}
