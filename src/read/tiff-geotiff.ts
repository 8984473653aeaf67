/** The geotiff library, loaded only when a TIFF is read, and its decoders with a bound. */
import type { Pool } from 'geotiff';
import { inflate } from './tiff-inflate.ts';

type Geotiff = typeof import('geotiff');

/** Stored bytes from which a deflate block is inflated with a bound; smaller ones cannot swell past 68 MB. */
const boundedFrom = 65536;

export function loadGeotiff(): Promise<Geotiff> {
  return import('geotiff');
}

/** geotiff's decoders on this thread; no block gives more bytes than its pixels need. */
export function boundedDecoders({ Pool, getDecoder }: Geotiff): Pool {
  class BoundedDecoders extends Pool {
    override bindParameters(...[compression, parameters]: Parameters<Pool['bindParameters']>): ReturnType<Pool['bindParameters']> {
      const { tileWidth, tileHeight, bitsPerSample } = parameters;
      const size = tileWidth * tileHeight * Number([bitsPerSample].flat()[0]) / 8;
      return {
        decode: async (stored) => {
          const decoder = await getDecoder(compression, parameters);
          const deflated = compression === 8 || compression === 32946;
          if (deflated && stored.byteLength >= boundedFrom) decoder.decodeBlock = (block) => inflate(new Uint8Array(block), size);
          const bytes = await decoder.decode(stored);
          return bytes.byteLength > size ? bytes.slice(0, size) : bytes;
        },
      };
    }
  }
  // No threads of its own: reading already runs in a worker.
  return new BoundedDecoders(0);
}
