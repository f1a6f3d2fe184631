import { createRequire } from 'node:module';
import { fileURLToPath } from 'node:url';
import { Router } from 'express';

const require = createRequire(import.meta.url);

const FILES = {
  'base.css': fileURLToPath(new URL('./base.css', import.meta.url)),
  'parts.css': fileURLToPath(new URL('./parts.css', import.meta.url)),
  'places.css': fileURLToPath(new URL('./places.css', import.meta.url)),
  'mark.svg': fileURLToPath(new URL('./mark.svg', import.meta.url)),
  'roboto-400.woff2': require.resolve('@fontsource/roboto/files/roboto-latin-400-normal.woff2'),
  'roboto-500.woff2': require.resolve('@fontsource/roboto/files/roboto-latin-500-normal.woff2'),
  'roboto-700.woff2': require.resolve('@fontsource/roboto/files/roboto-latin-700-normal.woff2'),
  'roboto-mono-500.woff2': require.resolve('@fontsource/roboto-mono/files/roboto-mono-latin-500-normal.woff2'),
};

/** The few files every page of a stand-in needs; nothing comes from another host. */
export function assetRoutes(): Router {
  const router = Router();
  for (const [name, path] of Object.entries(FILES)) {
    router.get(`/_assets/${name}`, (_req, res) => {
      // The checkout may live below a folder whose name starts with a dot, which express would refuse by default.
      res.set('Cache-Control', 'public, max-age=300').sendFile(path, { dotfiles: 'allow' });
    });
  }
  return router;
}
