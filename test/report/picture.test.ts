import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import { decode } from 'fast-png';
import { causes } from '../../src/ledger/ledger.ts';
import { appearanceByCode, causeAppearance, hatchPeriod, isHatchInk } from '../../src/report/appearance.ts';
import { base64 } from '../../src/report/base64.ts';
import { cividis, cividisLength } from '../../src/report/cividis.ts';
import { causePicture, missingColour, pngAddress, rgbaOf, valuePicture } from '../../src/report/picture.ts';

/** CIE 1976 lightness of an sRGB colour (IEC 61966-2-1, ISO/CIE 11664-4). */
function lightness(colour: readonly number[]): number {
  const linear = colour.map((level) => (level <= 0.04045 * 255 ? level / 255 / 12.92 : ((level / 255 + 0.055) / 1.055) ** 2.4));
  const [r = 0, g = 0, b = 0] = linear;
  const y = 0.2126 * r + 0.7152 * g + 0.0722 * b;
  return y > 216 / 24389 ? 116 * Math.cbrt(y) - 16 : (y * 24389) / 27;
}

const rgb = (hex: string): number[] => [1, 3, 5].map((at) => Number.parseInt(hex.slice(at, at + 2), 16));

describe('cividis', () => {
  it('[P] has the ends of the table that matplotlib distributes', () => {
    // First and last row of _cm_listed.py, rounded to 8 bits.
    assert.deepEqual(cividis(0), [0, 34, 78]);
    assert.deepEqual(cividis(255), [254, 232, 56]);
    assert.equal(cividisLength, 256);
    assert.throws(() => cividis(256), RangeError);
    assert.throws(() => cividis(0.5), RangeError);
  });

  it('[F] rises in CIE lightness throughout, in steps that 8 bits cannot hide over two entries', () => {
    const rises = Array.from({ length: 256 }, (_, index) => lightness(cividis(index)));
    rises.slice(2).forEach((value, index) => assert.ok(value > (rises[index] ?? 0), `entry ${index + 2}: ${value}`));
  });
});

describe('appearance of causes', () => {
  it('gives every cause its own colour and tells hatchless ones apart by lightness', () => {
    assert.equal(appearanceByCode.length, causes.length);
    assert.equal(new Set(appearanceByCode.map(({ fill }) => fill)).size, causes.length);
    const hatched = appearanceByCode.filter(({ hatch }) => hatch !== 'none');
    assert.equal(new Set(hatched.map(({ hatch }) => hatch)).size, hatched.length);
    const plainOnes = appearanceByCode.filter(({ hatch }) => hatch === 'none').map(({ fill }) => lightness(rgb(fill))).sort((a, b) => a - b);
    plainOnes.slice(1).forEach((value, index) => assert.ok(value - (plainOnes[index] ?? 0) > 15));
  });

  it('[P] takes bubble, residue, wrinkle, short, thin, thick and starved from Okabe & Ito (2008)', () => {
    const { bubble, residue, wrinkle, short, thin, thick, starved } = causeAppearance;
    assert.deepEqual([bubble, residue, wrinkle, short, thin, thick, starved].map(({ fill }) => rgb(fill)), [
      [86, 180, 233], [230, 159, 0], [204, 121, 167], [213, 94, 0], [240, 228, 66], [0, 114, 178], [0, 158, 115],
    ]);
  });

  it('draws hatches that repeat, cover part of the ground, stand out in lightness and all differ', () => {
    const drawn = new Set<string>();
    for (const { hatch, fill, ink } of appearanceByCode.filter((look) => look.hatch !== 'none')) {
      const cells = Array.from({ length: hatchPeriod ** 2 }, (_, i) => isHatchInk(hatch, i % hatchPeriod, Math.floor(i / hatchPeriod)));
      const share = cells.filter(Boolean).length / cells.length;
      assert.ok(share >= 0.1 && share <= 0.5, `${hatch} covers ${share}`);
      assert.ok(Math.abs(lightness(rgb(fill)) - lightness(rgb(ink))) > 20, hatch);
      assert.equal(isHatchInk(hatch, 3 + hatchPeriod, 5), isHatchInk(hatch, 3, 5 + hatchPeriod));
      drawn.add(cells.map(Number).join(''));
    }
    assert.equal(drawn.size, 10);
  });
});

describe('pictures', () => {
  it('runs from dark blue to yellow, clips outside and greys what is missing', () => {
    const picture = valuePicture(Float32Array.of(-5, 0, 1, 9, Number.NaN, 0.5), { columns: 3, rows: 2 }, 0, 1);
    const rgba = rgbaOf(picture);
    const pixel = (index: number): number[] => [...rgba.subarray(index * 4, index * 4 + 4)];
    assert.deepEqual(pixel(0), [0, 34, 78, 255]);
    assert.deepEqual(pixel(1), [0, 34, 78, 255]);
    assert.deepEqual(pixel(2), [254, 232, 56, 255]);
    assert.deepEqual(pixel(3), [254, 232, 56, 255]);
    assert.deepEqual(pixel(4), [...missingColour, 255]);
    assert.deepEqual(pixel(5), [...cividis(128), 255]);
  });

  it('reduces maps of more than 768 pixels on a side by a whole number, by the mean of what is there', () => {
    const columns = 1536;
    const values = Float32Array.from({ length: columns }, (_, index) => (index % 4 === 0 ? 0 : index % 4 === 1 ? 254 : index % 4 === 2 ? Number.NaN : 100));
    const picture = valuePicture(values, { columns, rows: 1 }, 0, 254);
    assert.deepEqual([picture.width, picture.height], [768, 1]);
    assert.deepEqual([...picture.indices.subarray(0, 4)], [127, 100, 127, 100]);
  });

  it('reduces causes to the most common one and keeps the map’s proportions', () => {
    // Boxes of 2 × 2 on a map of 2048²: three of thick beat one of thin, everywhere.
    const side = 2048;
    const codes = Uint8Array.from({ length: side * side }, (_, index) => (index % 2 === 0 && Math.floor(index / side) % 2 === 0 ? 8 : 9));
    const picture = causePicture(codes, { columns: side, rows: side }, 1);
    assert.deepEqual([picture.width, picture.height], [1024, 1024]);
    assert.deepEqual([...new Set(picture.indices)].sort((a, b) => a - b), [18, 19]);
    const small = causePicture(Uint8Array.of(1, 6), { columns: 2, rows: 1 }, 4);
    assert.deepEqual([small.width, small.height], [640, 160]);
    assert.deepEqual([small.indices[0], small.indices[319], small.indices[320], small.indices[639]], [2, 2, 12, 12]);
  });

  it('encodes PNGs that decode to the same pixels', () => {
    const picture = valuePicture(Float32Array.of(0, 1, Number.NaN, 2), { columns: 2, rows: 2 }, 0, 2);
    const address = pngAddress(picture);
    assert.ok(address.startsWith('data:image/png;base64,'));
    const decoded = decode(Buffer.from(address.slice(address.indexOf(',') + 1), 'base64'));
    assert.deepEqual([decoded.width, decoded.height, decoded.channels], [2, 2, 1]);
    assert.deepEqual([...decoded.data], [...picture.indices]);
    assert.deepEqual(decoded.palette?.map((colour) => colour.slice(0, 3)), picture.palette.map((colour) => [...colour]));
  });

  it('[P] writes base64 as RFC 4648, section 10, does', () => {
    const texts = ['', 'f', 'fo', 'foo', 'foob', 'fooba', 'foobar'].map((text) => base64(new TextEncoder().encode(text)));
    assert.deepEqual(texts, ['', 'Zg==', 'Zm8=', 'Zm9v', 'Zm9vYg==', 'Zm9vYmE=', 'Zm9vYmFy']);
  });
});
