/** Every internal address of the product as a function, so that a renamed page breaks its links at compile time. */
export const routes = {
	front: () => '/',
	signIn: (next?: string) => (next ? `/sign-in?next=${encodeURIComponent(next)}` : '/sign-in'),
	/** The sign-in of a demonstration, with one of its people filled in. */
	signInAs: (email: string) => `/sign-in?as=${encodeURIComponent(email)}`,
	signInAndSend: () => '/sign-in/send',
	signOut: () => '/sign-out',
	invitation: (token: string) => `/invite/${token}`,
	looseEnds: () => '/loose-ends',
	failedMessage: (id: string) => `/loose-ends/messages/${id}`,
	untoldVisit: (id: string) => `/loose-ends/visits/${id}`,
	inboundText: (id: string) => `/loose-ends/texts/${id}`,
	ward: (unitId?: string) => (unitId ? `/ward?unit=${unitId}` : '/ward'),
	admit: (unitId?: string) => (unitId ? `/ward/admit?unit=${unitId}` : '/ward/admit'),
	patient: (episodeId: string) => `/patients/${episodeId}`,
	thread: (episodeId: string, threadId: string) => `/patients/${episodeId}/threads/${threadId}`,
	clearances: (episodeId: string) => `/patients/${episodeId}/clearances`,
	clearance: (episodeId: string, id: string) => `/patients/${episodeId}/clearances/${id}`,
	sessions: (episodeId: string) => `/patients/${episodeId}/sessions`,
	newSession: (episodeId: string) => `/bedside/${episodeId}`,
	escalate: (episodeId: string, query = '') => `/patients/${episodeId}/escalate${query}`,
	move: (episodeId: string) => `/patients/${episodeId}/move`,
	details: (episodeId: string) => `/patients/${episodeId}/details`,
	refer: (episodeId: string) => `/patients/${episodeId}/refer`,
	escalation: (id: string) => `/escalations/${id}`,
	phoneLink: (token: string) => `/t/${token}`,
	patientPage: (token: string) => `/p/${token}`,
	patientCalendar: (token: string) => `/p/${token}/visits.ics`,
	visits: (query = '') => `/visits${query}`,
	patientVisits: (episodeId: string) => `/patients/${episodeId}/visits`,
	patientVisit: (episodeId: string, id: string) => `/patients/${episodeId}/visits#visit-${id}`,
	closedDays: () => '/visits/closed-days',
	cover: () => '/cover',
	rules: (unitId?: string) => (unitId ? `/rules?unit=${unitId}` : '/rules'),
	calculators: () => '/rules/calculators',
	account: () => '/account',
	level: (episodeId: string) => `/patients/${episodeId}/level`,
	patientLimits: (episodeId: string) => `/patients/${episodeId}/limits`,
	adminActivities: (unitId: string, code: string) =>
		`/admin/limits/activities?unit=${unitId}&activity=${code}`,
	adminLimits: (unitId?: string) => (unitId ? `/admin/limits?unit=${unitId}` : '/admin/limits'),
	adminMessages: (query = '') => `/admin/messages${query}`,
	adminMessage: (id: string) => `/admin/messages/${id}`,
	adminReceived: (query = '') => `/admin/messages/received${query}`,
	adminTemplates: () => '/admin/messages/templates',
	messagesExport: (query = '') => `/api/messages/export${query}`,
	adminAccounts: () => '/admin/accounts',
	adminAccount: (id: string) => `/admin/accounts/${id}`,
	phones: () => '/phones',
	demoSignIns: () => '/demo'
} as const;

/**
 * The address to go to after signing in. Only a path of our own is accepted: `//host`, `\host` and schemes
 * would send a person who just typed a password to somebody else's page.
 */
export function safeNext(next: string | null | undefined, fallback: string = routes.looseEnds()): string {
	if (!next || !/^\/(?![/\\])[\w\-./?=&%~]*$/.test(next) || /%0[ad]|%2f|%5c/i.test(next)) {
		return fallback;
	}
	return next;
}
