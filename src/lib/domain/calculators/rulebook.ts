/** The calculators as a list to read, for the page 'Rules and sources': formula, range and where each comes from. */
import type { SourceStatus } from '../bedside';

export interface CalculatorEntry {
	readonly name: string;
	/** The calculator of the page that works it out, by its identifier. */
	readonly page: string;
	readonly formula: string;
	/** What the formula was made for; beyond it the number is shown and marked. */
	readonly range: string;
	readonly source: string;
	readonly address: string | null;
	readonly status: SourceStatus;
}

const ACSM = 'ACSM Health and Fitness Journal 2020, metabolic calculations';
const ACSM_ADDRESS = 'https://journals.lww.com/acsm-healthfitness';

export const CALCULATORS: readonly CalculatorEntry[] = [
	{
		name: 'Early-warning score (NEWS2)',
		page: 'early-warning',
		formula: 'Seven observations at rest, 0 to 3 points each',
		range: 'Adults, not in pregnancy; second saturation scale only on the entry of a named clinician',
		source: 'Royal College of Physicians 2017, chart 1 as reproduced',
		address: 'https://www.scribd.com/document/584338409',
		status: 'published'
	},
	{
		name: 'Energy of walking',
		page: 'energy',
		formula: '3.5 + 0.1 x m/min + 1.8 x m/min x grade, mL/kg/min; METs are a 3.5th of it',
		range: '50 to 100 m/min',
		source: ACSM,
		address: ACSM_ADDRESS,
		status: 'published'
	},
	{
		name: 'Energy of running',
		page: 'energy',
		formula: '3.5 + 0.2 x m/min + 0.9 x m/min x grade, mL/kg/min',
		range: 'over 134 m/min (range from memory)',
		source: ACSM,
		address: ACSM_ADDRESS,
		status: 'published'
	},
	{
		name: 'Energy of stepping',
		page: 'energy',
		formula: '3.5 + 0.2 x steps/min + 1.33 x 1.8 x height in m x steps/min, mL/kg/min',
		range: '12 to 30 steps/min, 0.04 to 0.40 m (range from memory)',
		source: 'Topend Sports, ACSM stepping equation',
		address: 'https://www.topendsports.com/testing/equation-acsm-stepping',
		status: 'published'
	},
	{
		name: 'Energy of cycling with the legs',
		page: 'energy',
		formula: '7 + 10.8 x W / kg, mL/kg/min',
		range: '50 to 200 W',
		source: ACSM,
		address: ACSM_ADDRESS,
		status: 'published'
	},
	{
		name: 'Energy of cycling with the arms',
		page: 'energy',
		formula: '3.5 + 18.36 x W / kg, mL/kg/min',
		range: '25 to 125 W',
		source: 'ACSM metabolic equations',
		address: null,
		status: 'memory'
	},
	{
		name: 'Target heart rate',
		page: 'heart-rate-target',
		formula: 'resting + fraction x (maximum - resting)',
		range: 'The maximum is predicted by a named method; a measured one is better',
		source: 'Heart-rate reserve, Whitworth University',
		address: 'https://academic.whitworth.edu/hs433/heart_rate_reserve.htm',
		status: 'published'
	},
	{
		name: 'Maximum heart rate, 220 - age',
		page: 'heart-rate-target',
		formula: '220 - age',
		range: 'General; standard deviation 10 to 12 beats',
		source: 'Medicine and Science in Sports and Exercise, May 2007',
		address: 'https://journals.lww.com/acsm-msse',
		status: 'published'
	},
	{
		name: 'Maximum heart rate, 208 - 0.7 age',
		page: 'heart-rate-target',
		formula: '208 - 0.7 x age',
		range: 'General, healthy adults',
		source: 'Zhu 2010',
		address: 'https://doi.org/10.1249/MSS.0b013e3181cf8242',
		status: 'published'
	},
	{
		name: 'Maximum heart rate, 164 - 0.7 age',
		page: 'heart-rate-target',
		formula: '164 - 0.7 x age',
		range: 'Coronary disease on a beta-blocker, sinus rhythm, 40 to 80 years; standard error 18 beats',
		source: 'Brawner 2004',
		address: 'https://doi.org/10.1016/j.ahj.2004.04.035',
		status: 'published'
	},
	{
		name: 'Six-minute walk',
		page: 'walk-test',
		formula:
			'men 7.57 x cm - 5.02 x years - 1.76 x kg - 309; women 2.11 x cm - 2.29 x kg - 5.78 x years + 667, metres',
		range: '40 to 80 years; lower limit 153 m (men) or 139 m (women) below (both from memory)',
		source: 'European Respiratory Journal, reference equations',
		address: 'https://erj.ersjournals.com/highwire/markup/107615',
		status: 'published'
	},
	{
		name: 'Mean pressure',
		page: 'pressures',
		formula: 'diastolic + (systolic - diastolic) / 3',
		range: 'Regular rhythm',
		source: 'WikiLectures, mean arterial pressure',
		address: 'https://www.wikilectures.eu/w/Mean_arterial_pressure',
		status: 'published'
	},
	{
		name: 'Rate-pressure product',
		page: 'pressures',
		formula: 'heart rate x systolic',
		range: 'An index of the oxygen demand of the heart',
		source: 'Gobel 1978, Circulation 57:549',
		address: null,
		status: 'published'
	},
	{
		name: 'Shock index',
		page: 'pressures',
		formula: 'heart rate / systolic',
		range: 'Drugs that slow the heart make it look better',
		source: 'Koch 2019',
		address: 'https://doi.org/10.2147/OAEM.S178358',
		status: 'published'
	},
	{
		name: 'Maximum heart rate, heart failure on a beta-blocker',
		page: 'heart-failure-maximum',
		formula: '119 + 0.5 x resting - 0.5 x age; 5 lower on a cycle',
		range: 'Heart failure on a beta-blocker; standard error 18 beats',
		source: 'Keteyian 2012',
		address: 'https://pubmed.ncbi.nlm.nih.gov/21900844/',
		status: 'published'
	},
	{
		name: 'Highest heart rate of an inpatient',
		page: 'inpatient-ceiling',
		formula: 'resting + 30, and never over the cap of the set',
		range: 'Inpatients after heart surgery; a cautious floor and no training dose',
		source: 'Inpatient exercise limits of the ACSM line, as given in study notes',
		address: 'https://www.brainscape.com/flashcards/cardiac-rehab-8733959',
		status: 'secondary'
	},
	{
		name: 'A change of the six-minute walk that matters',
		page: 'walk-change',
		formula: '25 m in coronary disease; 23 m pooled, 30 m general (from memory), 36 m in heart failure',
		range: 'Two tests on the same corridor; the first is a rehearsal',
		source: 'Gremeaux 2011',
		address: 'https://doi.org/10.1016/j.apmr.2010.11.023',
		status: 'published'
	},
	{
		name: 'Pulse pressure',
		page: 'pressures',
		formula: 'systolic - diastolic',
		range: 'Asked about under 10 and over 150 mmHg',
		source: 'common practice, no published source',
		address: null,
		status: 'common-practice'
	},
	{
		name: 'Orthostatic hypotension',
		page: 'orthostatic',
		formula:
			'a fall of 20 systolic or 10 diastolic on standing after lying, 30 systolic where the pressure was high; 15 or 7 after sitting',
		range: 'After five minutes lying down, within three minutes of standing',
		source: 'Consensus on orthostatic hypotension 2011, as summarised; sitting: Shaw 2017',
		address: 'https://doi.org/10.1007/978-3-030-62493-4_5',
		status: 'published'
	},
	{
		name: 'Risk class of an outpatient',
		page: 'risk-class',
		formula:
			'high by any one mark or an ejection fraction under 40 %; low from 50 % and 7 METs without a mark; else moderate',
		range: 'AACVPR line; what was not measured is never low',
		source: 'PMC8006124, table 3',
		address: 'https://www.ncbi.nlm.nih.gov/pmc/articles/PMC8006124/',
		status: 'published'
	},
	{
		name: 'Three-ball spirometer',
		page: 'spirometer',
		formula: 'flow of the highest ball (600, 900, 1200 mL/s) x seconds',
		range: 'An estimate: the marks are flows, and a bench test found more at each',
		source: 'Instructions for incentive spirometers (world.physio congress); 900 mL/s from a leaflet',
		address: null,
		status: 'published'
	},
	{
		name: 'Corridor',
		page: 'corridor',
		formula: 'laps x twice the length; speed is distance / minutes; METs by the walking equation',
		range: '50 to 100 m/min; most ward walks are slower, and are marked',
		source: ACSM,
		address: ACSM_ADDRESS,
		status: 'published'
	}
];
