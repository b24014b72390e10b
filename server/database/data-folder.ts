import { existsSync } from 'node:fs';

/** `data/` at the top of the checkout, from the sources and from the build alike. */
function find(): URL {
  for (const up of ['../../data/', '../../../data/']) {
    const folder = new URL(up, import.meta.url);
    if (existsSync(new URL('materials.json', folder))) return folder;
  }
  throw new Error('The folder data/ was not found');
}

export const dataFolder = find();
