import { readFile, writeFile } from 'node:fs/promises';
import { allRoutes } from '../routes.ts';
import { openApiDocument } from './openapi.ts';

const file = new URL('./openapi.json', import.meta.url);
const document = `${JSON.stringify(openApiDocument(allRoutes(async () => null)), null, 2)}\n`;

if (process.argv.includes('--check')) {
  if ((await readFile(file, 'utf8')) !== document) {
    process.stderr.write(
      'server/http/openapi.json is out of date: run `npx tsx server/http/openapi-cli.ts`.\n',
    );
    process.exitCode = 1;
  }
} else {
  await writeFile(file, document);
}
