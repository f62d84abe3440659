/**
 * Symptoms. What a patient feels or what shows on the patient stops the session when it may mean that heart,
 * brain, wound or lines are in trouble; everything else cautions. Breathlessness stops from grade 3 (can hardly
 * go on) and cautions below it or where nobody graded it.
 */
import type { SymptomCode } from '../codes';
import type { RuleFinding } from '../finding';
import { crosses } from '../limits/limits';
import { cite, type SourceId } from '../limits/sources';
import { plain } from '../numbers';
import { limitOf, overLimit, withoutLimit, type Facts, type GradedSymptom, type Rule } from './rule';

interface SymptomEntry {
	readonly word: string;
	readonly grade: 'stop' | 'caution';
	readonly source: SourceId;
}

const SYMPTOM_TABLE: Readonly<Record<SymptomCode, SymptomEntry>> = {
	angina: { word: 'chest pain from the heart', grade: 'stop', source: 'inpatient-stop' },
	dizziness: { word: 'dizziness', grade: 'stop', source: 'common-practice' },
	'light-headedness': { word: 'light-headedness', grade: 'stop', source: 'common-practice' },
	fainting: { word: 'fainting', grade: 'stop', source: 'common-practice' },
	confusion: { word: 'confusion', grade: 'stop', source: 'common-practice' },
	'sternal-click': { word: 'a click of the breastbone', grade: 'stop', source: 'sternal-symptoms' },
	pallor: { word: 'pallor', grade: 'stop', source: 'common-practice' },
	distress: { word: 'distress', grade: 'stop', source: 'common-practice' },
	'new-bleeding': { word: 'new bleeding', grade: 'stop', source: 'early-mobilisation' },
	'line-dislodged': { word: 'a line or drain out of place', grade: 'stop', source: 'common-practice' },
	breathlessness: { word: 'breathlessness', grade: 'caution', source: 'dyspnoea-scale' },
	'wound-pain': { word: 'pain in the wound', grade: 'caution', source: 'common-practice' },
	palpitations: { word: 'palpitations', grade: 'caution', source: 'common-practice' },
	sweating: { word: 'sweating', grade: 'caution', source: 'common-practice' },
	nausea: { word: 'nausea', grade: 'caution', source: 'common-practice' }
};

/** True for a symptom that stops by itself, whatever its grade. */
export function symptomStops(code: SymptomCode): boolean {
	return SYMPTOM_TABLE[code].grade === 'stop';
}

export const symptomRule: Rule = {
	id: 'symptom',
	words:
		'A symptom that may mean trouble of heart, brain, wound or lines stops; breathlessness stops once it is severe; any other symptom cautions.',
	sources: ['inpatient-stop', 'sternal-symptoms', 'early-mobilisation', 'common-practice'],
	judge: (facts) => facts.symptoms.map((symptom) => judgeSymptom(facts, symptom)),
	lacks: () => false
};

function judgeSymptom(facts: Facts, { code, grade }: GradedSymptom): RuleFinding {
	const entry = SYMPTOM_TABLE[code];
	const limit = code === 'breathlessness' ? limitOf(facts, 'symptom.breathlessness') : null;
	if (limit && grade !== null && crosses(limit, grade)) {
		const reason = `The patient has breathlessness of grade ${plain(grade)}, which reaches the limit of grade ${plain(limit.value)}.`;
		return overLimit('symptom', 'stop', facts.stage, code, limit, reason);
	}
	const graded = grade === null ? '' : ` of grade ${plain(grade)}`;
	const reason = `The patient has ${entry.word}${graded}${adviceOf(entry, facts)}.`;
	return withoutLimit('symptom', entry.grade, facts.stage, code, reason, cite(entry.source));
}

/** What follows. Before a start a stop says by itself that there must be none. */
function adviceOf({ grade }: SymptomEntry, { stage }: Facts): string {
	if (grade === 'stop') {
		return stage === 'before' ? '' : ': that is a reason to stop';
	}
	return stage === 'before' ? ': start only with caution' : ': go on with caution';
}
