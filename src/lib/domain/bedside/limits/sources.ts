/**
 * Where the limits and formulas come from. `published` was seen at the address given; `secondary` was seen only
 * in somebody's notes of the primary; `memory` is textbook knowledge nobody has looked up again, to be checked
 * before a clinical release; `common-practice` has no published source at all. Every finding says which.
 */
export const SOURCE_STATUSES = ['published', 'secondary', 'memory', 'common-practice'] as const;
export type SourceStatus = (typeof SOURCE_STATUSES)[number];

export interface Source {
	readonly title: string;
	readonly address: string | null;
	readonly status: SourceStatus;
}

export const SOURCES = {
	'rest-contraindications': {
		title: 'BMJ Open, table of contraindications to exercise training',
		address: 'https://bmjopen.bmj.com/highwire/markup/153030',
		status: 'published'
	},
	'early-mobilisation': {
		title: 'Critical Care Research and Practice 2020, early mobilisation in intensive care, tables 5 and 6',
		address: 'https://www.hindawi.com/journals/ccrp/2020/7840743/',
		status: 'published'
	},
	'stress-test': {
		title: 'American Family Physician 2017, reasons to end a cardiac stress test',
		address: 'https://www.aafp.org/pubs/afp/issues/2017/0901/p293',
		status: 'published'
	},
	'inpatient-stop': {
		title: 'Inpatient stop criteria of the ACSM and AACVPR line, as given in study notes',
		address: 'https://id.scribd.com/document/391873909',
		status: 'secondary'
	},
	'inpatient-dose': {
		title: 'Inpatient exercise limits of the ACSM line, as given in study notes',
		address: 'https://www.brainscape.com/flashcards/cardiac-rehab-8733959',
		status: 'secondary'
	},
	'rest-tachycardia': {
		title: 'Contraindication of an uncontrolled resting rate, as given in study notes',
		address: 'https://www.brainscape.com/flashcards/cardiac-rehab-1012924',
		status: 'secondary'
	},
	'textbook-strict': {
		title: "O'Sullivan, Schmitz and Fulk, Physical Rehabilitation, chapter on heart disease",
		address: null,
		status: 'memory'
	},
	'rest-rate-call': { title: 'Resting rate that asks for a call first', address: null, status: 'memory' },
	'ward-saturation': { title: 'Saturation at which a ward holds exercise', address: null, status: 'memory' },
	oximetry: {
		title: 'AARC exercise oximetry protocol',
		address: 'https://www.phenxtoolkit.org/protocols/view/91001',
		status: 'published'
	},
	'orthostatic-consensus': {
		title: 'Consensus on orthostatic hypotension 2011, as summarised',
		address: 'https://doi.org/10.1007/978-3-030-62493-4_5',
		status: 'published'
	},
	'dyspnoea-scale': { title: 'ACSM scale of breathlessness, 1 to 4', address: null, status: 'memory' },
	'sternal-symptoms': {
		title: 'Heart Online, exercise following cardiac interventions',
		address: 'https://www.heartonline.org.au',
		status: 'published'
	},
	'arm-height': { title: 'Local rule of arms no higher than 90 degrees', address: null, status: 'memory' },
	'rate-slowing': {
		title: 'Keteyian 2023, heart rate of rehabilitation patients on a beta-blocker',
		address: 'https://www.nursingcenter.com/journalarticle?Article_ID=6809315',
		status: 'published'
	},
	'postoperative-rhythm': {
		title: 'Atrial fibrillation after surgical revascularisation (Rostagno, abstract)',
		address: 'https://www.semanticscholar.org/paper/a08c06d94b658978b0c50bf7b84f831d95f66279',
		status: 'published'
	},
	'level-bands': {
		title: "Step levels of inpatient programmes in the textbook line (O'Sullivan; AACVPR; Wenger)",
		address: null,
		status: 'memory'
	},
	'spirometer-dose': {
		title: 'Leaflet on the use of an incentive spirometer at home',
		address: 'https://homehealthpatienteducation.com/?p=1576',
		status: 'secondary'
	},
	'common-practice': {
		title: 'common practice, no published source',
		address: null,
		status: 'common-practice'
	}
} as const satisfies Record<string, Source>;

export type SourceId = keyof typeof SOURCES;

const STATUS_MARK: Record<SourceStatus, string> = {
	published: '',
	secondary: ' (secondary source)',
	memory: ' (from memory, not yet verified)',
	'common-practice': ''
};

/** The source as a finding carries it: title and, where it is weaker than published, how much weaker. */
export function cite(id: SourceId): string {
	const { title, status } = SOURCES[id];
	return `${title}${STATUS_MARK[status]}`;
}
