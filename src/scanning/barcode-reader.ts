import wasmAddress from 'zxing-wasm/reader/zxing_reader.wasm?url';
import { BarcodeDetector, prepareZXingModule } from 'barcode-detector/ponyfill';

/** Reads the QR codes in a picture or in what a video shows now. */
export interface BarcodeReader {
  read(source: HTMLVideoElement | ImageBitmap | Blob): Promise<string[]>;
}

/** The reader with its engine from our own files. Loaded lazily: it is larger than the rest of the page. */
export async function makeBarcodeReader(): Promise<BarcodeReader> {
  await prepareZXingModule({
    overrides: {
      locateFile: (file: string, folder: string) => (file.endsWith('.wasm') ? wasmAddress : folder + file),
    },
    fireImmediately: true,
  });
  const detector = new BarcodeDetector({ formats: ['qr_code'] });
  return {
    read: async (source) =>
      (await detector.detect(source)).map(({ rawValue }) => rawValue).filter((text) => text !== ''),
  };
}
