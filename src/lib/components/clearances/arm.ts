/** A small figure seen from the side, its arm raised by so many degrees from hanging down. */
export interface ArmDrawing {
	/** The arm, from the shoulder. */
	arm: string;
	/** All the way from hanging down to there, as a wedge. */
	sweep: string;
}

/** Where the shoulder is and how long the arm, in the units of the drawing. */
const SHOULDER = { x: 14, y: 20 };
const ARM = 17;

/** @param degrees 0 hangs down, 90 points forward, 180 overhead */
export function armAt(degrees: number): ArmDrawing {
	const angle = (degrees * Math.PI) / 180;
	const hand = { x: round(SHOULDER.x + ARM * Math.sin(angle)), y: round(SHOULDER.y + ARM * Math.cos(angle)) };
	const start = `M${SHOULDER.x} ${SHOULDER.y}`;
	return {
		arm: `${start}L${hand.x} ${hand.y}`,
		sweep: `${start}V${SHOULDER.y + ARM}A${ARM} ${ARM} 0 0 0 ${hand.x} ${hand.y}Z`
	};
}

function round(value: number): number {
	return Math.round(value * 10) / 10;
}
