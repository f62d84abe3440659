import type { VisitState } from '../core/codes';
import type { MessageLanguage } from '../messages/templates/wording';
import type { ReachProblem } from '../messages/reach';
import type { PageWay } from './forms';

/** A visit as its patient sees it. */
export interface OwnVisit {
	id: string;
	/** RFC 3339. */
	startsAt: string;
	minutes: number;
	place: string;
	state: VisitState;
	/** The patient has cancelled it, and nobody else. */
	byPatient: boolean;
	/** Counts the changes of its time. */
	sequence: number;
}

/** What a patient's page shows. Nothing of it is clinical, because a link can fall into other hands. */
export interface PatientPage {
	language: MessageLanguage;
	visits: OwnVisit[];
	/** Until when the link opens the page, RFC 3339. */
	expiresAt: string;
	/** The hospital's zone: times are those of the clock on its wall. */
	zone: string;
	now: number;
}

/** Whether a patient has a link to their page, for those who sent it. */
export interface PageLinkLine {
	id: string;
	way: PageWay;
	/** RFC 3339, both. */
	createdAt: string;
	expiresAt: string;
	/** What became of the message with the link; as in the message log. */
	message: string;
}

/** What can be done about a patient's page, for those who plan visits. */
export interface PageSharing {
	/** The link that opens the page now. */
	link: PageLinkLine | null;
	/** Each way to send one, and what stands in its way. */
	ways: { way: PageWay; problem: ReachProblem | null }[];
}
