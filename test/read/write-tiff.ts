/** Writes small TIFFs for tests: any byte order, BigTIFF, strips or tiles; packs their blocks as LZW or PackBits, with differences. */

export type TagValue = { type: 'ascii'; text: string } | { type: 'short' | 'long' | 'double' | 'rational'; values: readonly number[] };

export interface PageSpec {
  readonly tags: Readonly<Record<number, TagValue>>;
  /** Blocks as stored. Offsets and byte counts are filled in, unless the tags give the counts. */
  readonly blocks: readonly Uint8Array[];
  readonly tiled?: boolean;
}

const sizes = { ascii: 1, short: 2, long: 4, double: 8, rational: 8 } as const;
const codes = { ascii: 2, short: 3, long: 4, double: 12, rational: 5 } as const;

export function writeTiff(pages: readonly PageSpec[], how: { bigEndian?: boolean; big?: boolean } = {}): Uint8Array {
  const little = how.bigEndian !== true;
  const big = how.big === true;
  const bytes: number[] = [];
  const put = (value: number, size: 1 | 2 | 4 | 8, at = bytes.length) => {
    const view = new DataView(new ArrayBuffer(8));
    if (size === 1) view.setUint8(0, value);
    if (size === 2) view.setUint16(0, value, little);
    if (size === 4) view.setUint32(0, value, little);
    if (size === 8) view.setBigUint64(0, BigInt(value), little);
    for (let i = 0; i < size; i++) bytes[at + i] = view.getUint8(i);
  };
  const pointerSize = big ? 8 : 4;
  bytes.push(...(little ? [0x49, 0x49] : [0x4d, 0x4d]));
  put(big ? 43 : 42, 2);
  if (big) { put(8, 2); put(0, 2); }
  let link = bytes.length;
  put(0, pointerSize);
  for (const page of pages) {
    const offsets = page.blocks.map((block) => {
      const at = bytes.length;
      for (const byte of block) bytes.push(byte);
      if (bytes.length % 2 === 1) bytes.push(0);
      return at;
    });
    const [offsetTag, countTag] = page.tiled === true ? [324, 325] : [273, 279];
    const tags: Record<number, TagValue> = {
      [offsetTag]: { type: 'long', values: offsets },
      [countTag]: { type: 'long', values: page.blocks.map((block) => block.length) },
      ...page.tags,
    };
    const entries = Object.entries(tags).map(([tag, value]) => ({ tag: Number(tag), value })).sort((a, b) => a.tag - b.tag);
    const encoded = entries.map(({ tag, value }) => {
      const count = value.type === 'ascii' ? new TextEncoder().encode(value.text).length + 1 : value.values.length;
      const length = count * sizes[value.type];
      let at: number | undefined;
      if (length > pointerSize) { at = bytes.length; putValue(value); if (bytes.length % 2 === 1) bytes.push(0); }
      return { tag, value, count, at };
    });
    put(bytes.length, pointerSize, link);
    put(entries.length, big ? 8 : 2);
    for (const { tag, value, count, at } of encoded) {
      put(tag, 2);
      put(codes[value.type], 2);
      put(count, pointerSize);
      const start = bytes.length;
      if (at === undefined) putValue(value); else put(at, pointerSize);
      while (bytes.length < start + pointerSize) bytes.push(0);
    }
    link = bytes.length;
    put(0, pointerSize);
  }
  return Uint8Array.from(bytes);

  function putValue(value: TagValue): void {
    if (value.type === 'ascii') {
      bytes.push(...new TextEncoder().encode(value.text), 0);
      return;
    }
    for (const number of value.values) {
      if (value.type === 'short') put(number, 2);
      else if (value.type === 'long') put(number, 4);
      else if (value.type === 'rational') { put(number, 4); put(1, 4); }
      else {
        const view = new DataView(new ArrayBuffer(8));
        view.setFloat64(0, number, little);
        for (let i = 0; i < 8; i++) bytes.push(view.getUint8(i));
      }
    }
  }
}

/** Tags of a map of one sample per pixel; more may be added over them. */
export function mapTags(columns: number, rows: number, bits: number, format: 1 | 2 | 3, more: Readonly<Record<number, TagValue>> = {}): Record<number, TagValue> {
  const short = (value: number): TagValue => ({ type: 'short', values: [value] });
  return {
    256: { type: 'long', values: [columns] }, 257: { type: 'long', values: [rows] }, 258: short(bits), 259: short(1), 262: short(1),
    277: short(1), 278: { type: 'long', values: [rows] }, 339: short(format), ...more,
  };
}

/** Bytes of float32 values. */
export function float32Bytes(values: readonly number[], bigEndian = false): Uint8Array {
  const view = new DataView(new ArrayBuffer(4 * values.length));
  values.forEach((value, i) => view.setFloat32(4 * i, value, !bigEndian));
  return new Uint8Array(view.buffer);
}

/** A float32 map in one strip. */
export function floatTiff(columns: number, rows: number, values: readonly number[], more: Readonly<Record<number, TagValue>> = {}): Uint8Array {
  return writeTiff([{ tags: mapTags(columns, rows, 32, 3, more), blocks: [float32Bytes(values)] }]);
}

/** Horizontal differences of 32-bit words per row, as predictor 2 stores them. */
export function differences(columns: number, words: Uint32Array): Uint8Array {
  const out = words.slice();
  for (let i = 0; i < out.length; i++) if (i % columns !== 0) out[i] = words[i]! - words[i - 1]!;
  return new Uint8Array(out.buffer);
}

/** Predictor 3: byte planes, most significant first, then byte differences per row. */
export function floatDifferences(columns: number, source: readonly number[]): Uint8Array {
  const out: number[] = [];
  for (let start = 0; start < source.length; start += columns) {
    const big = float32Bytes(source.slice(start, start + columns), true);
    const planes = [0, 1, 2, 3].flatMap((b) => Array.from({ length: columns }, (_, i) => big[4 * i + b]!));
    planes.forEach((byte, i) => out.push((byte - (i === 0 ? 0 : planes[i - 1]!)) & 255));
  }
  return Uint8Array.from(out);
}

/** LZW encoder after TIFF 6.0, section 13. */
export function encodeLzw(input: Uint8Array): Uint8Array {
  const out: number[] = [];
  let bits = 0;
  let held = 0;
  let width = 9;
  let next = 258;
  let table = new Map<string, number>();
  const emit = (code: number) => {
    bits = (bits << width) | code;
    held += width;
    while (held >= 8) { held -= 8; out.push((bits >> held) & 255); }
    bits &= (1 << held) - 1;
  };
  const codeOf = (text: string) => (text.length === 1 ? text.charCodeAt(0) : table.get(text));
  emit(256);
  let text = '';
  for (const byte of input) {
    const longer = text + String.fromCharCode(byte);
    if (codeOf(longer) !== undefined) { text = longer; continue; }
    emit(codeOf(text)!);
    table.set(longer, next++);
    text = String.fromCharCode(byte);
    if (next === 512 || next === 1024 || next === 2048) width++;
    if (next === 4095) { emit(256); table = new Map(); next = 258; width = 9; }
  }
  if (text !== '') { emit(codeOf(text)!); if (next + 1 === 512 || next + 1 === 1024 || next + 1 === 2048) width++; }
  emit(257);
  if (held > 0) out.push((bits << (8 - held)) & 255);
  return Uint8Array.from(out);
}

/** LZW codes as they are, with the widths a decoder expects. */
export function packCodes(codes: readonly number[]): Uint8Array {
  let text = '';
  let next = 258;
  for (const code of codes) {
    const width = next + 1 >= 4096 ? 12 : Math.max(9, Math.floor(Math.log2(next + 1)) + 1);
    text += code.toString(2).padStart(width, '0');
    if (code === 256) next = 257;
    else if (next < 4095) next++;
  }
  const bytes = text.match(/.{1,8}/g) ?? [];
  return Uint8Array.from(bytes, (byte) => Number.parseInt(byte.padEnd(8, '0'), 2));
}

/** PackBits after TIFF 6.0, section 9: literal runs, and runs of equal bytes. */
export function encodePackBits(input: Uint8Array): Uint8Array {
  const out: number[] = [];
  for (let at = 0; at < input.length;) {
    let run = 1;
    while (run < 128 && input[at + run] === input[at]) run++;
    if (run > 1) out.push(257 - run, input[at]!);
    else out.push(0, input[at]!);
    at += run;
  }
  return Uint8Array.from(out);
}
