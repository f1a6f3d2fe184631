import type { CameraState } from '@/composables/useBarcodeScanner.ts';

interface CameraHelp {
  title: string;
  text: string;
  act: string | null;
}

/** What to do where the camera does not show a picture. Typing and a scanner always work. */
export const CAMERA_HELP: Record<Exclude<CameraState, 'on'>, CameraHelp> = {
  off: {
    title: 'The camera is off',
    text: 'Start it here, use a scanner, or type the code from the label.',
    act: 'Start the camera',
  },
  starting: { title: 'Starting the camera', text: 'Allow the camera if you are asked.', act: null },
  insecure: {
    title: 'The camera needs a secure address',
    text: 'This page was opened without https. Open the farm by its https address, or type the code. Scanners work here too.',
    act: null,
  },
  missing: {
    title: 'No camera was found',
    text: 'Connect one and try again, use a scanner, or type the code.',
    act: 'Try again',
  },
  refused: {
    title: 'The camera is not allowed',
    text: 'Allow it for this page: tap the lock or the camera beside the address, set Camera to Allow, then try again. Typing the code works meanwhile.',
    act: 'Try again',
  },
  busy: {
    title: 'The camera is in use',
    text: 'Another program or page has it. Close that one, then try again.',
    act: 'Try again',
  },
  failed: {
    title: 'The camera did not start',
    text: 'Try again, or load the page anew. Typing the code works meanwhile.',
    act: 'Try again',
  },
};
