import type {
	Approach,
	ClearanceKind,
	ClearanceState,
	EscalationState,
	ReferralState,
	Rhythm,
	Service,
	Sex,
	VisitState
} from '../core/codes';
import type { ClearanceLimits } from '../clearances/forms';
import type { LocalActivity } from '../bedside/activities/local';
import type { LocalLayers } from '../bedside/limits/layers';
import type { LineKind } from '../lines/codes';
import type { LineNote, SaidOxygen, StandingOxygen } from '../lines/views';
import type { HangingEnd } from '../loose-ends/hanging';
import type { StandingWound } from '../wounds/stand';
import type { WoundNote } from '../wounds/views';
import type { Deciding, MayDoNow } from './may-do-now';
import type { Precautions } from './precautions';

/** Shapes that queries answer and pages show. Instants are RFC 3339, days `YYYY-MM-DD`. */
export interface PatientLine {
	id: string;
	name: string;
	mrn: string;
	birthDate: string;
	sex: Sex;
}

/** One row of the ward. */
export interface EpisodeListItem {
	id: string;
	patient: PatientLine;
	/** The unit's name. */
	unit: string;
	unitId: string;
	bed: string | null;
	procedure: string | null;
	operatedAt: string | null;
	postOpDay: number | null;
	level: number;
	betaBlocked: boolean | null;
	/** How many things are open about this patient. */
	looseEnds: number;
	/** What they are, the most urgent first. */
	ends: HangingEnd[];
	phase: 'inpatient' | 'outpatient';
	/** Null where levels do not decide: before the operation, and for outpatients. */
	mayDoNow: MayDoNow | null;
	/** What decides on it and is not on record: said before any permission. */
	notKnown: Deciding[];
	precautions: Precautions;
	/** Whether nothing may be taken by mouth; false also where nobody has said. */
	nothingByMouth: boolean;
	/** What is in, in the order of the list; empty for who may not see sessions. */
	lines: LineKind[];
	/** Null where nobody has said any, and for who may not see sessions. */
	oxygen: StandingOxygen | null;
	/** The most urgent escalation that is not settled; null also for who may not read any. */
	escalation: {
		id: string;
		grade: 'high' | 'medium' | 'low';
		state: 'raised' | 'taken';
		takenBy: string | null;
		/** Somebody has it and did not come, so that others are sought. */
		notThere: boolean;
	} | null;
}

export interface ClearanceLine {
	id: string;
	kind: ClearanceKind;
	state: ClearanceState;
	question: string;
	askedBy: string;
	askedAt: string;
	decidedBy: string | null;
	decidedAt: string | null;
	limits: ClearanceLimits | null;
	reviewOn: string | null;
	note: string | null;
	reason: string | null;
	/** Whether it counts from the latest operation; what an earlier one left behind permits nothing. */
	current: boolean;
}

/** Something done without its clearance that no decider has seen yet. */
export interface DeviationLine {
	id: string;
	sessionId: string;
	kind: ClearanceKind;
	/** How the clearance stood when it was done; null when nobody had asked for it. */
	stood: ClearanceState | null;
	reason: string;
	/** When the session began. */
	doneAt: string;
	recordedBy: string;
	recordedById: string;
}

export interface VisitLine {
	id: string;
	startsAt: string;
	minutes: number;
	place: string;
	state: VisitState;
}

/** A visit as the nameboard shows it. */
export interface BoardVisit extends VisitLine {
	/** What the closed day is called that it stands on while it is expected; null on an open one. */
	closedDay: string | null;
}

/** How a patient is reached, and at whose daytime. */
export interface PatientContact {
	phone: string | null;
	language: string;
	smsConsent: boolean;
	email: string | null;
	mailConsent: boolean;
	zone: string;
}

/** Everything on the nameboard of one patient. */
export interface Nameboard {
	id: string;
	/** With the contact for those who may use it. */
	patient: PatientLine & Partial<PatientContact>;
	unit: string;
	unitId: string;
	bed: string | null;
	phase: 'inpatient' | 'outpatient';
	/** The latest operation, of which the next ones speak; null without one. */
	operationId: string | null;
	procedure: string | null;
	approach: Approach | null;
	operatedAt: string | null;
	postOpDay: number | null;
	surgeon: { id: string; name: string } | null;
	/** Today's level, which can fall. */
	level: number;
	/** The highest level ever reached. */
	levelReached: number;
	betaBlocked: boolean | null;
	rhythm: Rhythm | null;
	/** Null where levels do not decide: before the operation, and for outpatients. */
	mayDoNow: MayDoNow | null;
	/** What decides on it and is not on record: said before any permission. */
	notKnown: Deciding[];
	precautions: Precautions;
	/** Whether nothing may be taken by mouth; false also where nobody has said. */
	nothingByMouth: boolean;
	/** What the unit says about activities in place of the catalogue. */
	wordings: LocalActivity[];
	/** What lies over the default limits for this patient; empty for who may not see sessions. */
	limits: LocalLayers;
	/** The newest notes about wound and breastbone, newest first; empty for who may not see sessions. */
	wounds: WoundNote[];
	/** How wound and breastbone stand after all notes; null where there are none, and for who may not see them. */
	wound: StandingWound | null;
	/** What is open about the patient, the most urgent first. */
	ends: HangingEnd[];
	/** What is in, in the order of the list; empty for who may not see sessions. */
	lines: LineKind[];
	/** All lines of the episode, those noted in last first; empty for who may not see sessions. */
	lineNotes: LineNote[];
	/** Null where nobody has said any, and for who may not see sessions. */
	oxygen: SaidOxygen | null;
	referrals: {
		id: string;
		service: Service;
		state: ReferralState;
		threadId: string;
		question: string;
		askedBy: string;
		askedAt: string;
	}[];
	threads: { id: string; service: Service; state: ReferralState }[];
	clearances: ClearanceLine[];
	/** Those that no decider has seen yet, the oldest first; empty for who may not read sessions. */
	deviations: DeviationLine[];
	visits: BoardVisit[];
	escalations: {
		id: string;
		grade: 'high' | 'medium' | 'low';
		state: EscalationState;
		situation: string;
		raisedAt: string;
		raisedById: string;
		takenBy: string | null;
		/** Somebody has it and did not come, so that others are sought. */
		notThere: boolean;
	}[];
}
