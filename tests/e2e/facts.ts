/**
 * What a reader looks for on each page of the demonstration, by the page's file: words that come out of the database,
 * or that are the page's own matter.
 */
export const FACTS: Record<string, readonly string[]> = {
	'/': ['After open-heart surgery', 'Try it as one of them', 'Surgeon H. Castellane'],
	'/sign-in': ['E-mail address', 'Password'],
	'/sign-in/send': ['Drain out at two, the wound is dry.', 'E-mail address', 'Password'],
	'/invite/[token]': ['new.admin@saltmarsh.example', 'At least 15 characters'],
	'/p/[token]': ['No visit is planned for you now.'],
	'/t/[token]': ['Raised by a therapist.', 'nobody has it yet', 'I take it'],
	'/account': ['Ivo Aldous', 'therapist@saltmarsh.example', 'Tern Ward'],
	'/admin/accounts': ['Desmond Quaye', 'nurse2@saltmarsh.example'],
	'/admin/accounts/[id]': ['@saltmarsh.example', 'In use'],
	'/admin/limits': ['inpatients are judged by the set', 'Change a limit'],
	'/admin/limits/activities': ['Ankle pumps'],
	'/admin/messages': ['Everything that has left', 'What the templates say', 'Rona Ferris'],
	'/admin/messages/[id]': ['Of use until', 'Cause', 'Identifier at the gateway'],
	'/admin/messages/received': ['What came in'],
	'/admin/messages/templates': ['Tern Ward'],
	'/bedside/[episodeId]': ['This page needs script. Write the readings down', 'Beatrix Thornhaven'],
	'/cover': ['Nurse in charge', 'Rona Ferris', 'Hilde Castellane'],
	'/escalations/[id]': ['nobody has it yet', 'fell from 128 to 108 after walking.', 'Ivo Aldous raised it.'],
	'/loose-ends': ['Waiting on you', 'Edda Harrow', 'You wait for', 'Beatrix Thornhaven'],
	'/loose-ends/[what]/[id]': ['Is this the hospital?', 'What was done about it'],
	'/loose-ends/visits': ['is cancelled.', 'I have told them'],
	'/patients/[id]': [
		'SG-39870',
		'Level 6 of 6',
		'nobody has it yet',
		'One flight of stairs',
		'rate-slowing drug'
	],
	'/patients/[id]/clearances': ['Arm stage', 'Not cleared', 'Treadmill', 'asked, not decided'],
	'/patients/[id]/clearances/[clearanceId]': ['Ivo Aldous asks', 'exertion 12', 'What it rests on', 'day 28'],
	'/patients/[id]/details': ['Consents to text messages', 'A further operation'],
	'/patients/[id]/escalate': ['Emergency call: 112', 'Situation', 'Raise it'],
	'/patients/[id]/level': ['4 to 5 METs', 'reasons that hold back'],
	'/patients/[id]/limits': ['the limits of the unit judge', 'Pulse 85 to 108', 'Marta Lisowska'],
	'/patients/[id]/move': ['Now in East Gym.', 'Went home'],
	'/patients/[id]/refer': ['Speech therapy', 'How soon', 'What you ask'],
	'/patients/[id]/sessions': ['recorded by Ivo Aldous', 'Cycling'],
	'/patients/[id]/threads/[threadId]': [
		'Please take her on for the supervised programme.',
		'12 visits booked'
	],
	'/patients/[id]/visits': ['Ahead', 'planned', 'Past', 'attended', 'East Gym'],
	'/rules': ['Rules and sources', 'Sternal precautions end by a surgeon', 'Ankle pumps'],
	'/rules/calculators': ['need script', 'no result replaces the call bell'],
	'/visits': ['Week of Monday', 'Rosamund Mallin', 'East Gym'],
	'/visits/closed-days': ['No closed day ahead', 'This form needs script in this browser.'],
	'/ward': ['Edda Harrow', 'Aortic valve replacement', 'bed one helper'],
	'/ward/admit': ['Hospital number', 'Admit']
};
