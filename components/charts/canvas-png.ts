import { pageGround } from '@/components/charts/page-ground';

/** PNG of a canvas on the page's ground (a canvas itself is transparent). Rejects where the browser makes none. */
export function canvasPng(canvas: HTMLCanvasElement): Promise<Blob> {
  const copy = document.createElement('canvas');
  copy.width = canvas.width;
  copy.height = canvas.height;
  const context = copy.getContext('2d');
  if (!context) return Promise.reject(new Error('this browser gives no drawing surface'));
  context.fillStyle = pageGround();
  context.fillRect(0, 0, copy.width, copy.height);
  context.drawImage(canvas, 0, 0);
  return new Promise((resolve, reject) =>
    copy.toBlob(
      (blob) => (blob ? resolve(blob) : reject(new Error('the picture could not be made'))),
      'image/png',
    ),
  );
}
