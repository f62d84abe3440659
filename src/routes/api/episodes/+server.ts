import { admitBody } from '$lib/domain/episodes/forms';
import { admitPatient } from '$lib/server/episodes/actions';
import { reading, writing } from '$lib/server/http/endpoint';
import { pageRequest } from '$lib/server/http/paging';
import { read } from '$lib/server/read';

export const GET = reading({
	permission: 'episode.read',
	run: (context, { url }) => read.episodes(context, url.searchParams.get('unit'), pageRequest(url))
});

export const POST = writing({
	permission: 'episode.admit',
	body: admitBody,
	status: 201,
	run: (context, input) => admitPatient(context, input)
});
