/** Writes small TIFFs for tests: any byte order, BigTIFF, strips or tiles, compressions by the caller. */

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
