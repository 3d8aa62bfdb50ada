import sharp from 'sharp';

/** A plain picture that is a photo as far as its format goes. */
export function plainJpeg(widthPx = 320, heightPx = 200): Promise<Buffer> {
  return sharp({ create: { width: widthPx, height: heightPx, channels: 3, background: '#d8c7a3' } })
    .jpeg()
    .toBuffer();
}
