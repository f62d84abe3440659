const SVG = 'http://www.w3.org/2000/svg';
const AMPLITUDE = 3.6;
const PITCH = 22;
const LENGTH = 44;
const MIDDLE = 8;
const STEP = 0.5;
const DYES = ['--woad', '--moss', '--heather'];

/**
 * Draws the mark: three strands laid together. Each is a wave, a third of a turn after the one before; where its
 * cosine is positive it passes in front. All back halves come first, then all front halves, each over a darker and
 * wider stroke; the front ones have a light yarn along them.
 * @param {Element} svg
 */
export function drawMark(svg) {
	for (const isFront of [false, true]) {
		DYES.forEach((dye, strand) => {
			for (const run of runsOf(strand, isFront)) {
				const colour = `var(${dye})`;
				svg.append(stroke(run, 'under', colour), stroke(run, isFront ? 'front' : 'back', colour));
				if (isFront) {
					svg.append(stroke(run, 'yarn', ''));
				}
			}
		});
	}
}

/**
 * The stretches of one strand that lie in front, or behind.
 * @param {number} strand
 * @param {boolean} isFront
 * @returns {string[]} path data
 */
function runsOf(strand, isFront) {
	const runs = [];
	let points = [];
	for (let s = 0; s <= LENGTH; s += STEP) {
		const turn = (2 * Math.PI * s) / PITCH + (2 * Math.PI * strand) / 3;
		if (Math.cos(turn) >= 0 === isFront) {
			points.push(`${s},${(MIDDLE + AMPLITUDE * Math.sin(turn)).toFixed(2)}`);
		} else if (points.length > 0) {
			runs.push(points);
			points = [];
		}
	}
	return [...runs, points].filter((run) => run.length > 1).map((run) => `M${run.join(' L')}`);
}

/**
 * @param {string} path
 * @param {string} name
 * @param {string} colour
 */
function stroke(path, name, colour) {
	const element = document.createElementNS(SVG, 'path');
	element.setAttribute('d', path);
	element.setAttribute('class', name);
	if (colour) {
		element.style.stroke = colour;
	}
	return element;
}
