import { readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { projectFolder } from '../project-folder.ts';

let templates: Readonly<Record<string, string>> | undefined;

/** Text of every template by its path below `templates/`, read once. */
export function readTemplates(): Readonly<Record<string, string>> {
  templates ??= Object.fromEntries(
    readdirSync(join(projectFolder, 'templates'), { withFileTypes: true })
      .filter((folder) => folder.isDirectory())
      .flatMap(({ name: folder }) =>
        readdirSync(join(projectFolder, 'templates', folder))
          .filter((file) => file.endsWith('.liquid'))
          .map((file) => [
            `${folder}/${file}`,
            readFileSync(join(projectFolder, 'templates', folder, file), 'utf8'),
          ]),
      ),
  );
  return templates;
}
