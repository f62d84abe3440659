/**
 * Figures that stand in advice and warnings beside the rules, each with where it comes from and how well that is known.
 * Made from the constants that are used, so that the page and the document cannot tell another one.
 */
import { PROGRESS_SYSTOLIC_RISE } from '../bedside/progress';
import { CALM_HOURS_BEFORE_WALKING } from '../bedside/readiness';
import { SOURCES, type SourceStatus } from '../bedside/limits/sources';
import {
	BREATHS_PER_HOUR_HINT,
	DISCHARGE_GOAL_BALLS,
	LEAST_CAPACITY_ML_PER_KG
} from '../calculators/spirometer';

export interface AdviceFigure {
	readonly figure: string;
	readonly source: string;
	readonly status: SourceStatus;
	/** Where it stands in the code. */
	readonly path: string;
}

const PRACTICE = { source: SOURCES['common-practice'].title, status: 'common-practice' } as const;
const SPIROMETER = 'src/lib/domain/calculators/spirometer.ts';
const READINESS = 'src/lib/domain/bedside/readiness.ts';
const { from, to } = PROGRESS_SYSTOLIC_RISE;
const [few, many] = DISCHARGE_GOAL_BALLS;

export const ADVICE_FIGURES: readonly AdviceFigure[] = [
	{
		figure: `A systolic pressure that rises ${from} to ${to} mmHg above rest speaks for the next level; more than ${to} holds the level`,
		source: 'Step programmes in the AACVPR line',
		status: 'memory',
		path: 'src/lib/domain/bedside/progress.ts'
	},
	{
		figure: `Before daily walking: no chest pain, no new rhythm and no change of the tracing for ${CALM_HOURS_BEFORE_WALKING} hours`,
		...cited('inpatient-dose'),
		path: READINESS
	},
	{
		figure: 'Before daily walking: no new sign that the heart is failing',
		source: 'AACVPR guidelines',
		status: 'memory',
		path: READINESS
	},
	{ figure: `Three-ball spirometer: ${few} to ${many} balls by discharge`, ...PRACTICE, path: SPIROMETER },
	{
		figure: `Three-ball spirometer: more than ${BREATHS_PER_HOUR_HINT} breaths in an hour bring on a hint about over-use`,
		source: 'Practice of chest physiotherapy',
		status: 'memory',
		path: SPIROMETER
	},
	{
		figure: `Three-ball spirometer: a vital capacity under ${LEAST_CAPACITY_ML_PER_KG} mL per kg is too little for it to help`,
		source: 'Practice of chest physiotherapy',
		status: 'memory',
		path: SPIROMETER
	}
];

function cited(id: keyof typeof SOURCES): Pick<AdviceFigure, 'source' | 'status'> {
	const { title, status } = SOURCES[id];
	return { source: title, status };
}
