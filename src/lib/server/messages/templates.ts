import { previewsOf, type TemplatePreview } from '$lib/domain/messages/preview';
import { requirePermission } from '../access/require';
import type { PersonContext } from '../context';
import { env } from '../env';

/** What people get, with this hospital's name and numbers. */
export function listTemplates({ actor, now }: PersonContext): TemplatePreview[] {
	requirePermission(actor, 'message-log.read');
	const { hospital, publicUrl } = env();
	const { name: sender, ...rest } = hospital;
	return previewsOf({ ...rest, sender, address: publicUrl }, now);
}
