/** Raw bytes of numbers to JavaScript numbers; shared by the binary decoders. */
import type { Values } from './decoded-map.ts';

export type NumberKind = 'unsigned' | 'signed' | 'float';

/** Whether this machine stores the low byte first. */
export const nativeLittleEndian = new Uint8Array(new Uint16Array([1]).buffer)[0] === 1;

/** Reverses the bytes of every number of `size` bytes, in place. */
export function swapBytes(bytes: Uint8Array, size: number): void {
  const half = size >> 1;
  for (let start = 0; start + size <= bytes.length; start += size) {
    for (let k = 0; k < half; k++) {
      const low = bytes[start + k]!;
      bytes[start + k] = bytes[start + size - 1 - k]!;
      bytes[start + size - 1 - k] = low;
    }
  }
}

/**
 * Numbers from `bytes`, which must be in this machine's byte order; trailing bytes of an incomplete number are left out.
 * Types of at most 16 bits and single floats become Float32Array (exact), all others Float64Array
 * (64-bit integers beyond 2^53 are rounded). The result may share memory with `bytes`.
 * Sizes: unsigned and signed 1, 2, 4, 8 bytes; float 2, 4, 8 bytes. Throws RangeError for others.
 */
export function numbersFrom(bytes: Uint8Array, kind: NumberKind, size: number): Values {
  const count = Math.floor(bytes.length / size);
  const aligned = bytes.byteOffset % size === 0 ? bytes : bytes.slice();
  const { buffer, byteOffset } = aligned;
  switch (`${kind}${size}`) {
    case 'unsigned1': return Float32Array.from(new Uint8Array(buffer, byteOffset, count));
    case 'unsigned2': return new Float32Array(new Uint16Array(buffer, byteOffset, count));
    case 'unsigned4': return new Float64Array(new Uint32Array(buffer, byteOffset, count));
    case 'unsigned8': return wide(new BigUint64Array(buffer, byteOffset, count));
    case 'signed1': return new Float32Array(new Int8Array(buffer, byteOffset, count));
    case 'signed2': return new Float32Array(new Int16Array(buffer, byteOffset, count));
    case 'signed4': return new Float64Array(new Int32Array(buffer, byteOffset, count));
    case 'signed8': return wide(new BigInt64Array(buffer, byteOffset, count));
    case 'float2': return halves(new Uint16Array(buffer, byteOffset, count));
    case 'float4': return new Float32Array(buffer as ArrayBuffer, byteOffset, count);
    case 'float8': return new Float64Array(buffer as ArrayBuffer, byteOffset, count);
    default: throw new RangeError(`no number type ${kind} of ${size} bytes`);
  }
}

function wide(source: BigInt64Array | BigUint64Array): Float64Array {
  const out = new Float64Array(source.length);
  for (let i = 0; i < out.length; i++) out[i] = Number(source[i]);
  return out;
}

/** IEEE 754 binary16: 1 sign bit, 5 exponent bits (bias 15), 10 fraction bits. */
function halves(source: Uint16Array): Float32Array {
  const out = new Float32Array(source.length);
  for (let i = 0; i < out.length; i++) {
    const bits = source[i]!;
    const exponent = (bits >> 10) & 31;
    const fraction = bits & 1023;
    const size = exponent === 0 ? fraction * 2 ** -24
      : exponent === 31 ? (fraction === 0 ? Infinity : Number.NaN)
      : (1 + fraction / 1024) * 2 ** (exponent - 15);
    out[i] = bits & 0x8000 ? -size : size;
  }
  return out;
}
