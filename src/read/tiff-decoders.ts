/** geotiff's decoders with a bound on what one block may give. */
import type { Pool } from 'geotiff';
import { inflate } from './tiff-inflate.ts';

/** Stored bytes from which a deflate block is inflated with a bound; smaller ones cannot swell past 68 MB. */
const boundedFrom = 65536;

/** For `readRasters`: the decoders of the loaded library, on this thread, none giving more bytes than the block's pixels need. */
export function boundedDecoders({ Pool, getDecoder }: typeof import('geotiff')): Pool {
  class BoundedDecoders extends Pool {
    override bindParameters(...[compression, parameters]: Parameters<Pool['bindParameters']>): ReturnType<Pool['bindParameters']> {
      const { tileWidth, tileHeight, bitsPerSample } = parameters;
      const size = tileWidth * tileHeight * Number([bitsPerSample].flat()[0]) / 8;
      const opened = getDecoder(compression, parameters).then((decoder) => {
        const whole = decoder.decodeBlock.bind(decoder);
        const deflate = compression === 8 || compression === 32946;
        decoder.decodeBlock = (block) => (deflate && block.byteLength >= boundedFrom ? inflate(new Uint8Array(block), size) : whole(block));
        return decoder;
      });
      return {
        decode: async (stored) => {
          const bytes = await (await opened).decode(stored);
          return bytes.byteLength > size ? bytes.slice(0, size) : bytes;
        },
      };
    }
  }
  // 0: no threads of its own, reading already runs in a worker.
  return new BoundedDecoders(0);
}
