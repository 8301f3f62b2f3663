import { readFileSync } from 'node:fs';
import path from 'node:path';
import express, { Router } from 'express';

/** The built web: hashed files for ever, index.html for every other page with this answer's nonce in it. */
export function webFiles(webDir: string): Router {
  const index = readFileSync(path.join(webDir, 'index.html'), 'utf8');
  const files = Router();
  files.use(
    '/assets',
    express.static(path.join(webDir, 'assets'), {
      immutable: true,
      maxAge: '1y',
      index: false,
      fallthrough: false,
    }),
  );
  files.use(express.static(webDir, { index: false, maxAge: '1h' }));
  files.get('/{*page}', (_req, res) => {
    res.setHeader('Cache-Control', 'no-store');
    res.type('html').send(index.replaceAll('__CSP_NONCE__', String(res.locals.nonce)));
  });
  return files;
}
