/**
 * Words that must never stand in a message that leaves the product: a telephone lies on a kitchen table, and its
 * lock screen shows the text to everybody. Each entry is the beginning of a word, lower case, without accents.
 * The list also guards names that a hospital chooses itself (sender, places): a centre called after a disease
 * would tell the disease.
 */
export const DENIED = {
	diagnosis: words(`
		aneurysm angina arrhythm atrial bleed cancer coronary delirium diabet diagnos disease dissection
		dysphag dysphon effusion embol endocard failure fibrillat fracture haemorrh heart hemorrh hypertens
		hypotens infarct infect ischaem ischem mediastin murmur palpitat pericard pneumon regurgit sepsis
		stenosis stroke symptom syncop tachycard tamponad thrombo tumour wound
	`),
	procedure: words(`
		ablation anaesth anesth angiogra aortic bypass cabg catheter chest dialysis drain extubat graft
		incision intubat mitral operat pacemaker pacing procedure resect stent stern sternal surg sutur tavi
		theatre tracheo transplant treadmill tricuspid tube valve ventilat
	`),
	drug: words(`
		amiodaron amlodipin antibiot apixaban aspirin atorvastatin beta-block betablock bisoprolol captopril
		carvedilol clopidogrel codein digoxin dose drug enalapril enoxaparin furosemid heparin insulin
		medicat medicin metoprolol morphin noradrenal opioid oxycod paracetamol prescri ramipril rivaroxaban
		sotalol spironolact statin tablet warfarin
	`),
	result: words(`
		abnormal beats blood bpm creatinin diastol ecg echo ejection ekg haemoglob hemoglob inr mmhg oxygen
		positive potassium pressure pulse result saturat scan spo2 systol temperature test troponin x-ray
		xray
	`),
	specialty: words(`
		cardi ccu consultant geriatr icu intensive itu neurolog oncolog palliat patholog pharmac physio
		psychiatr psycholog pulmon radiolog rehab respirat speech swallow therap thorac vascular
	`)
};

const PATTERN = new RegExp(`(?<![\\p{L}\\p{N}])(${Object.values(DENIED).flat().join('|')})`, 'giu');

/** The denied beginnings of words in a text, lower case, in order; empty for a text that may leave. */
export function deniedWords(text: string): string[] {
	return [...folded(text).matchAll(PATTERN)].map(([word]) => word.toLowerCase());
}

/** Without accents, so that no spelling slips through. */
function folded(text: string): string {
	return text.normalize('NFKD').replace(/\p{M}/gu, '');
}

function words(text: string): readonly string[] {
	return text.trim().split(/\s+/);
}
