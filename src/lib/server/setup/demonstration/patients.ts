import type { Approach, Sex } from '$lib/domain/core/codes';
import type { PersonKey } from './people';

/** An invented patient. `betaBlocked` means any rate-slowing drug; null where nobody has said. */
export interface DemoPatient {
	name: string;
	birthDate: string;
	sex: Sex;
	mrn: string;
	phone?: string;
	smsConsent: boolean;
	procedure: string;
	approach: Approach;
	betaBlocked: boolean | null;
	surgeon: PersonKey;
}

const BYPASS = 'Coronary artery bypass, three grafts';
const BYPASS_FOUR = 'Coronary artery bypass, four grafts';
const AORTIC = 'Aortic valve replacement';
const MITRAL = 'Mitral valve repair';

/** The patients by the names that the stories use, the freshest operation first. */
export const PATIENTS = {
	harrow: {
		name: 'Edda Harrow',
		birthDate: '1951-03-14',
		sex: 'female',
		mrn: 'SG-40211',
		phone: '+353862000001',
		smsConsent: false,
		procedure: AORTIC,
		approach: 'sternotomy',
		betaBlocked: null,
		surgeon: 'surgeon'
	},
	pell: {
		name: 'Conrad Pell',
		birthDate: '1957-11-02',
		sex: 'male',
		mrn: 'SG-40187',
		phone: '+353862000002',
		smsConsent: true,
		procedure: BYPASS,
		approach: 'sternotomy',
		betaBlocked: true,
		surgeon: 'surgeon'
	},
	vantry: {
		name: 'Ottilie Vantry',
		birthDate: '1946-07-29',
		sex: 'female',
		mrn: 'SG-40164',
		smsConsent: false,
		procedure: 'Aortic root replacement',
		approach: 'sternotomy',
		betaBlocked: true,
		surgeon: 'surgeon2'
	},
	aske: {
		name: 'Gideon Aske',
		birthDate: '1962-01-20',
		sex: 'male',
		mrn: 'SG-40139',
		phone: '+353862000004',
		smsConsent: true,
		procedure: MITRAL,
		approach: 'other',
		betaBlocked: false,
		surgeon: 'surgeon2'
	},
	dunmore: {
		name: 'Wilma Dunmore',
		birthDate: '1954-05-08',
		sex: 'female',
		mrn: 'SG-40120',
		phone: '+353862000005',
		smsConsent: true,
		procedure: BYPASS,
		approach: 'sternotomy',
		betaBlocked: true,
		surgeon: 'surgeon'
	},
	reeve: {
		name: 'Matthias Reeve',
		birthDate: '1958-09-05',
		sex: 'male',
		mrn: 'SG-40098',
		phone: '+353862000006',
		smsConsent: true,
		procedure: BYPASS_FOUR,
		approach: 'sternotomy',
		betaBlocked: true,
		surgeon: 'surgeon'
	},
	sorrel: {
		name: 'Ines Sorrel',
		birthDate: '1966-12-17',
		sex: 'female',
		mrn: 'SG-40077',
		phone: '+353862000007',
		smsConsent: true,
		procedure: AORTIC,
		approach: 'sternotomy',
		betaBlocked: false,
		surgeon: 'surgeon'
	},
	brackwater: {
		name: 'Tobias Brackwater',
		birthDate: '1949-08-11',
		sex: 'male',
		mrn: 'SG-40061',
		phone: '+353862000008',
		smsConsent: true,
		procedure: BYPASS_FOUR,
		approach: 'sternotomy',
		betaBlocked: true,
		surgeon: 'surgeon2'
	},
	lune: {
		name: 'Agnes Lune',
		birthDate: '1960-02-26',
		sex: 'female',
		mrn: 'SG-40052',
		phone: '+353862000009',
		smsConsent: true,
		procedure: MITRAL,
		approach: 'sternotomy',
		betaBlocked: true,
		surgeon: 'surgeon'
	},
	carrow: {
		name: 'Piers Carrow',
		birthDate: '1955-10-03',
		sex: 'male',
		mrn: 'SG-40033',
		phone: '+353862000010',
		smsConsent: true,
		procedure: BYPASS,
		approach: 'sternotomy',
		betaBlocked: true,
		surgeon: 'surgeon2'
	},
	thorne: {
		name: 'Beatrix Thornhaven',
		birthDate: '1959-06-21',
		sex: 'female',
		mrn: 'SG-39870',
		phone: '+353862000011',
		smsConsent: true,
		procedure: BYPASS,
		approach: 'sternotomy',
		betaBlocked: true,
		surgeon: 'surgeon'
	},
	ferrow: {
		name: 'Lucan Ferrow',
		birthDate: '1963-04-30',
		sex: 'male',
		mrn: 'SG-39744',
		phone: '+353862000012',
		smsConsent: true,
		procedure: AORTIC,
		approach: 'sternotomy',
		betaBlocked: true,
		surgeon: 'surgeon'
	},
	mallin: {
		name: 'Rosamund Mallin',
		birthDate: '1952-01-09',
		sex: 'female',
		mrn: 'SG-39611',
		phone: '+353862000013',
		smsConsent: true,
		procedure: BYPASS_FOUR,
		approach: 'sternotomy',
		betaBlocked: false,
		surgeon: 'surgeon2'
	},
	oakes: {
		name: 'Silas Oakenrow',
		birthDate: '1961-09-15',
		sex: 'male',
		mrn: 'SG-39480',
		phone: '+353862000014',
		smsConsent: true,
		procedure: BYPASS,
		approach: 'sternotomy',
		betaBlocked: true,
		surgeon: 'surgeon'
	}
} as const satisfies Record<string, DemoPatient>;
export type PatientKey = keyof typeof PATIENTS;
