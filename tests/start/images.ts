import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';

export const ROOT = fileURLToPath(new URL('../../', import.meta.url));

/** The command line that an image starts with, as its Dockerfile says it. */
export function startCommand(image: string): string[] {
  const text = readFileSync(join(ROOT, 'docker', image, 'Dockerfile'), 'utf8');
  return JSON.parse(/^CMD (\[.*\])$/m.exec(text)?.[1] ?? '[]') as string[];
}

/** The command line that the compose file gives a service instead of its image's. */
export function composeCommand(service: string): string[] {
  return JSON.parse(/^ {4}command: (\[.*\])$/m.exec(block(service))?.[1] ?? '[]') as string[];
}

/** What the compose file sets for a service, with `${NAME:?…}` filled in from `given`. */
export function composeEnvironment(
  service: string,
  given: Record<string, string>,
): Record<string, string> {
  const lines = /^ {4}environment:\n((?: {6}.*\n)+)/m.exec(block(service))?.[1] ?? '';
  return Object.fromEntries(
    lines
      .trim()
      .split('\n')
      .map((line) => {
        const [name = '', ...rest] = line.trim().split(': ');
        const value = rest.join(': ').replace(/^"(.*)"$/, '$1');
        return [name, value.replace(/\$\{(\w+):\?[^}]*\}/g, (_, key: string) => given[key] ?? '')];
      }),
  );
}

function block(service: string): string {
  const text = readFileSync(join(ROOT, 'docker/compose.yaml'), 'utf8');
  const [, after = ''] = text.split(`\n  ${service}:\n`);
  return after.split(/\n {2}\w+:\n/)[0] ?? '';
}
