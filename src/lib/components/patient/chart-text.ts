import { isInError } from '$lib/domain/bedside/amended';
import { isOneOf } from '$lib/domain/core/codes';
import { SYMPTOMS } from '$lib/domain/bedside/codes';
import type { SessionLine } from '$lib/domain/bedside/views';
import type { Nameboard } from '$lib/domain/episodes/views';
import { localDateOf } from '$lib/domain/core/time';
import { clock, day, type Reader } from '$lib/format';
import { readingText } from '$lib/i18n/readings';
import { m } from '$lib/i18n/paraglide/messages';
import { SYMPTOM_WORDS } from '../bedside/words';
import { outcomeWords } from './words';

type Board = Pick<Nameboard, 'patient' | 'procedure'>;

/**
 * One session as a text to copy into the chart, so that nothing is typed twice: whose it is by name and two more
 * identifiers, when, what was done, every reading, what was felt and found, and what was said about it since.
 */
export function chartText(session: SessionLine, { patient, procedure }: Board, reader: Reader): string {
	const activities = session.activities.map(({ name }) => name).join(', ');
	const symptoms = session.symptoms.map(symptomWords).join(', ');
	const during = session.during.map(readingText).join('; ');
	const lines = [
		isInError(session) ? m.patient_chart_in_error() : '',
		[patient.name, m.patient_born({ day: day(patient.birthDate) }), patient.mrn, procedure]
			.filter(Boolean)
			.join(', '),
		m.patient_chart_session({
			from: stamp(session.startedAt, reader),
			until: clock(Date.parse(session.endedAt), reader.zone),
			level: session.level,
			name: session.recordedBy
		}),
		m.patient_chart_done({ activities: activities || m.patient_session_no_activity() }),
		m.patient_chart_before({ reading: readingText(session.before) }),
		during && m.patient_chart_during({ readings: during }),
		m.patient_chart_after({ reading: readingText(session.after) }),
		symptoms && m.patient_chart_symptoms({ symptoms }),
		m.patient_chart_outcome({ outcome: outcomeWords(session.outcome, session.findings) }),
		...session.findings.filter(({ grade }) => grade !== 'note').map(({ reason }) => `- ${reason}`),
		session.deviation && m.patient_session_deviation({ reason: session.deviation.reason }),
		...session.amendments.map(({ body, by, at }) =>
			m.patient_chart_amended({ body, by, at: stamp(at, reader) })
		)
	];
	return lines.filter(Boolean).join('\n');
}

/** With its year: a chart is read later, and elsewhere. */
function stamp(instant: string, { zone }: Reader): string {
	const at = Date.parse(instant);
	return `${day(localDateOf(at, zone))}, ${clock(at, zone)}`;
}

function symptomWords(code: string): string {
	return isOneOf(SYMPTOMS, code) ? SYMPTOM_WORDS[code]() : code;
}
