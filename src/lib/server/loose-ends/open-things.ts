import { sql, type SQL } from 'drizzle-orm';
import { strayIn } from '../access/messages';
import { visitsOnClosedDays, visitsUnmarked, visitsUnconfirmed } from './visits';
import { IS_NEWS_OF_CHANGE, visitsUntold } from '../visits/untold';
import { precautionsDue } from './precautions-due';
import { PLACE } from './place';

/**
 * Loose ends are derived, never stored, so they cannot go stale: one query over the tables, a branch for each
 * kind of thing that can be open, all answering the same columns. Whose it is decides a pure function afterwards.
 * A new kind is one more branch here and one more case in `domain/loose-ends`.
 */
export function openThingsSql(unitIds: readonly string[], now: number): SQL {
	const units = sql.join(
		unitIds.map((id) => sql`${id}`),
		sql`, `
	);
	const branches = [
		escalationsUntaken,
		escalationsHeld,
		escalationsPassed,
		rechecksDue,
		physiciansToTell,
		clearancesAsked,
		questionsBack,
		refusalsUnseen,
		deviationsUnseen,
		precautionsDue(now),
		referralsAsked,
		questionsOpen,
		signOffsAsked,
		visitsCancelled,
		visitsOnClosedDays(now),
		visitsUnconfirmed(now),
		visitsUnmarked(now),
		visitsUntold(now),
		messagesFailed,
		textsUnread(unitIds)
	];
	return sql`
		with place as (
			select e.id, e.unit_id, u.name as unit, e.bed, p.name as patient, e.patient_id
			from episodes e
			join units u on u.id = e.unit_id
			join patients p on p.id = e.patient_id
			where e.unit_id in (${units})
		), open as (${sql.join(branches, sql` union all `)})
		select open.*, ${FURTHER_CALLERS} as "alsoAskedByIds" from open`;
}

/**
 * Whoever has called into an open escalation waits for it as its raiser does; a pass is the giver's own ask.
 * A list of identifiers in JSON, null for what is no call for help.
 */
const FURTHER_CALLERS = sql`case when open.kind in (
	'escalation', 'escalation-taken', 'arrival', 'recheck', 'physician-to-tell'
) then (select json_group_array(distinct f.by_id) from escalation_facts f where f.escalation_id = open.id) end`;

/** What an escalation is about: the call that made it as grave as it is. */
const WHAT = sql`coalesce((
	select f.situation from escalation_facts f where f.escalation_id = x.id and f.raised_grade = 1
	order by f.at desc, f.id desc limit 1
), x.situation)`;

const escalationsUntaken = sql`
	select 'escalation' as "kind", x.id as "id", ${PLACE}, x.thread_id as "threadId", x.grade as "grade",
		null as "code", ${WHAT} as "text", x.raised_by as "askedById", asker.name as "askedBy",
		x.taken_by as "heldById", holder.name as "heldBy", x.raised_at as "since", x.needed_by as "due", null as "priority"
	from escalations x
	join place on place.id = x.episode_id
	join users asker on asker.id = x.raised_by
	left join users holder on holder.id = x.taken_by
	where x.state = 'raised' or (x.state = 'taken' and x.next_step_at is not null)`;

/** The holder who was asked whether they are there owes that answer first. */
const escalationsHeld = sql`
	select case when x.holder_asked_at is null then 'escalation-taken' else 'arrival' end, x.id, ${PLACE}, x.thread_id,
		x.grade, case when x.arrived_at is null then 'on-the-way' else 'at-bedside' end, ${WHAT}, x.raised_by, asker.name,
		x.taken_by, holder.name, coalesce(x.holder_asked_at, x.taken_at), x.needed_by, null
	from escalations x
	join place on place.id = x.episode_id
	join users asker on asker.id = x.raised_by
	join users holder on holder.id = x.taken_by
	where x.state = 'taken'`;

/** Passed on: the receiver owes a yes to the giver, who has it until then. */
const escalationsPassed = sql`
	select 'confirm', x.id, ${PLACE}, x.thread_id, x.grade, null, ${WHAT}, x.taken_by, giver.name,
		x.pass_to, receiver.name, (
			select max(v.at) from escalation_moves v where v.escalation_id = x.id and v.kind = 'passed'
		), x.needed_by, null
	from escalations x
	join place on place.id = x.episode_id
	join users giver on giver.id = x.taken_by
	join users receiver on receiver.id = x.pass_to
	where x.state = 'taken' and x.pass_to is not null`;

const rechecksDue = sql`
	select 'recheck', x.id, ${PLACE}, x.thread_id, null, null, null, x.raised_by, asker.name,
		x.ended_by, holder.name, x.ended_at, x.recheck_due_at, null
	from escalations x
	join place on place.id = x.episode_id
	join users asker on asker.id = x.raised_by
	join users holder on holder.id = x.ended_by
	where x.state = 'settled' and x.recheck_due_at is not null and x.recheck_done_at is null`;

/** A nurse who settles a high one says which physician knows of it; until then that is open. */
const physiciansToTell = sql`
	select 'physician-to-tell', x.id, ${PLACE}, x.thread_id, null, null, ${WHAT}, x.raised_by, asker.name,
		x.ended_by, holder.name, x.ended_at, null, null
	from escalations x
	join place on place.id = x.episode_id
	join users asker on asker.id = x.raised_by
	join users holder on holder.id = x.ended_by
	where x.state = 'settled' and x.grade = 'high' and x.informed is null and holder.role = 'nurse'`;

/** Held by whoever asked back: they wait for the answer, and the ask for them after that. */
const clearancesAsked = sql`
	select 'clearance', c.id, ${PLACE}, c.thread_id, null, c.kind, c.question, c.asked_by, asker.name,
		q.asked_by, decider.name, c.asked_at, null, null
	from clearances c
	join place on place.id = c.episode_id
	join users asker on asker.id = c.asked_by
	left join clearance_questions q on q.clearance_id = c.id and q.answered_at is null
	left join users decider on decider.id = q.asked_by
	where c.state = 'asked'`;

/** A decider's question back waits on whoever asked, as long as the ask itself is open. */
const questionsBack = sql`
	select 'clearance-question', c.id, ${PLACE}, c.thread_id, null, c.kind, q.question, q.asked_by, decider.name,
		c.asked_by, asker.name, q.asked_at, null, null
	from clearance_questions q
	join clearances c on c.id = q.clearance_id
	join place on place.id = c.episode_id
	join users decider on decider.id = q.asked_by
	join users asker on asker.id = c.asked_by
	where q.answered_at is null and c.state = 'asked'`;

/**
 * A no, or a yes that was taken back, is open until whoever asked has said that they saw it: else the ask would vanish
 * from what they wait for without their knowing how it ended. A new ask of the kind says as much.
 */
const refusalsUnseen = sql`
	select 'refusal', c.id, ${PLACE}, c.thread_id, null, c.kind, c.reason, c.decided_by, decider.name,
		c.asked_by, asker.name, c.decided_at, null, null
	from clearances c
	join place on place.id = c.episode_id
	join episodes e on e.id = c.episode_id
	join users decider on decider.id = c.decided_by
	join users asker on asker.id = c.asked_by
	where c.state in ('withheld', 'on-hold', 'withdrawn') and c.decided_by <> c.asked_by
		and c.refusal_seen_at is null and e.closed_at is null
		and not exists (
			select 1 from clearances later
			where later.episode_id = c.episode_id and later.kind = c.kind and later.asked_at > c.asked_at
		)`;

const deviationsUnseen = sql`
	select 'deviation', d.id, ${PLACE}, d.thread_id, null, d.kind, d.reason, d.recorded_by, doer.name,
		null, null, d.recorded_at, null, null
	from deviations d
	join place on place.id = d.episode_id
	join users doer on doer.id = d.recorded_by
	where d.seen_at is null`;

const referralsAsked = sql`
	select 'referral', r.id, ${PLACE}, t.id, null, r.service, r.question, r.asked_by, asker.name,
		null, null, r.asked_at, null, r.priority
	from referrals r
	join threads t on t.referral_id = r.id
	join place on place.id = r.episode_id
	join users asker on asker.id = r.asked_by
	where r.state = 'asked'`;

/** What a junior did or proposes beyond the cautious figure, until a senior has signed for it or said no. */
const signOffsAsked = sql`
	select 'sign-off', s.id, ${PLACE}, null, null, s.kind, s.words, s.asked_by, asker.name,
		null, null, s.asked_at, null, null
	from sign_offs s
	join place on place.id = s.episode_id
	join users asker on asker.id = s.asked_by
	where s.state = 'asked'`;

/** A question is closed when the one it was put to writes into the thread, or says that they have seen it. */
const questionsOpen = sql`
	select 'mention', q.id, ${PLACE}, n.thread_id, null, who.role, n.body, n.author_id, asker.name,
		q.user_id, who.name, n.at, null, null
	from mentions q
	join entries n on n.id = q.entry_id
	join threads t on t.id = n.thread_id
	join referrals r on r.id = t.referral_id
	join place on place.id = t.episode_id
	join users who on who.id = q.user_id
	left join users asker on asker.id = n.author_id
	where q.seen_at is null and r.state <> 'withdrawn' and not exists (
		select 1 from entries later
		where later.thread_id = n.thread_id and later.seq > n.seq and later.author_id = q.user_id
	)`;

/** A visit that the patient cancelled wants another date, until somebody has found one or said that none is wanted. */
const visitsCancelled = sql`
		select 'visit-cancelled', v.id, ${PLACE}, null, null, null, v.reason, null, null,
			null, null, v.decided_at, v.starts_at, null
		from visits v
		join place on place.id = v.episode_id
		where v.patient_cancelled_at is not null and v.followed_up_at is null`;

/** The stay that an answer to a patient's text is filed under, as the text itself. */
const NEWEST_EPISODE = sql`(
	select e.id from episodes e where e.patient_id = m.patient_id order by e.created_at desc, e.id desc limit 1
)`;

/**
 * A notice that somebody has it asks nothing of its reader: whether it arrived is nobody's to see to. News of a change
 * are told apart by whether the patient has heard of it in any way: `visitsUntold()`. A telephone rings only where a
 * text failed or may have: that text stands here, and nothing that went beside or after it.
 */
const messagesFailed = sql`
	select 'message-failed', m.id, ${PLACE}, null, null, m.kind, m.state_reason, null, null,
		null, null, m.created_at, null, null
	from outbox m
	left join visits v on m.ref_kind = 'visit' and v.id = m.ref_id
	left join escalations x on m.ref_kind = 'escalation' and x.id = m.ref_id
	left join referrals r on m.ref_kind = 'referral' and r.id = m.ref_id
	join place on place.id = coalesce(
		v.episode_id, x.episode_id, r.episode_id, case when m.ref_kind in ('page', 'episode') then m.ref_id end,
		case when m.ref_kind = 'inbound' then ${NEWEST_EPISODE} end
	)
	where m.state in ('failed', 'undelivered') and m.kind <> 'notice' and m.channel not in ('voice', 'push')
		and not (m.kind = 'escalation' and m.channel = 'mail')
		and m.handled_at is null
		and not ${IS_NEWS_OF_CHANGE}`;

/** Texts that no rule understood. What is filed under no patient has no place; who sees it decides `strayIn()`. */
function textsUnread(unitIds: readonly string[]): SQL {
	return sql`
		select 'inbound', inbound_messages.id, ${PLACE}, null, null, inbound_messages.understood_as, null, null, null,
			null, null, inbound_messages.at, null, null
		from inbound_messages
		left join place on place.id = (
			select e.id from episodes e where e.patient_id = inbound_messages.patient_id
			order by e.created_at desc, e.id desc limit 1
		)
		where inbound_messages.handled_at is null and (
			place.id is not null
			or ${strayIn(unitIds)}
		)`;
}
