import { writeFile } from 'node:fs/promises';
import { fixturePath } from '../fixture-files';
import { makeStarFiles, makeUploadFiles } from './make-files';

/** Writes the fixtures that are computed: run it after a change to the demo's plans or to the forward model. */
async function main(): Promise<void> {
  // The uploads are measured from the stars, so the stars' files come first.
  for (const make of [makeStarFiles, makeUploadFiles]) {
    for (const [name, content] of await make()) {
      await writeFile(fixturePath(name), content);
      console.log(`${name}: ${content.length} bytes`);
    }
  }
}

await main();
