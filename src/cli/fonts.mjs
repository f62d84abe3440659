import { writeFileSync } from 'node:fs';
import path from 'node:path';
import { cutFace, FACES } from './lib/font-faces.mjs';

/** `npm run fonts`: cuts the faces that are shipped anew. They are in the repository; a test compares them. */
const FOLDER = 'src/lib/fonts';

for (const face of FACES) {
	const file = path.join(FOLDER, `${face.weight}.woff2`);
	const bytes = await cutFace(face);
	writeFileSync(file, bytes);
	console.log(`${file}: ${bytes.length} bytes`);
}
