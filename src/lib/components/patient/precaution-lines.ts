import { localDateOf } from '$lib/domain/core/time';
import { endFallsDue, type Precautions } from '$lib/domain/episodes/precautions';
import { shortDay, type Reader } from '$lib/format';
import { m } from '$lib/i18n/paraglide/messages';

export interface PrecautionLine {
	term: string;
	words: string;
}

/** What holds now under sternal precautions, and what is due when: height and load, the arm stage, their end. */
export function precautionLines(precautions: Precautions, reader: Reader): PrecautionLine[] {
	const { maxElevationDeg, maxLoadKg, endDue } = precautions;
	const load =
		maxLoadKg === null ? m.patient_precautions_no_load() : m.patient_precautions_load({ kg: maxLoadKg });
	const overdue = endFallsDue(precautions, localDateOf(reader.now, reader.zone));
	const end = overdue ? m.patient_precautions_end_overdue : m.patient_precautions_end_due;
	return [
		...(maxElevationDeg === null
			? []
			: [
					{
						term: m.patient_precautions_now(),
						words: m.patient_precautions_arms({ degrees: maxElevationDeg, load })
					}
				]),
		{ term: m.patient_precautions_arm_stage(), words: armStageWords(precautions, reader) },
		...(endDue === null
			? []
			: [{ term: m.patient_precautions_end(), words: end({ day: shortDay(endDue, reader) }) }])
	];
}

function armStageWords({ armStage }: Precautions, reader: Reader): string {
	if (armStage === null) {
		return m.patient_precautions_arm_stage_open();
	}
	return armStage.reviewOn === null
		? m.patient_precautions_arm_stage_given()
		: m.patient_precautions_arm_stage_until({ day: shortDay(armStage.reviewOn, reader) });
}
