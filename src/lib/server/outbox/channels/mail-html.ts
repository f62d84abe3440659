const LINK = /https?:\/\/[^\s<>"]+/g;

/**
 * A plain text as simple HTML: its paragraphs, its links, and nothing else.
 * @param language of the text, so that it is read aloud as what it is
 */
export function htmlOf(text: string, language: string): string {
	const paragraphs = text
		.trim()
		.split(/\n{2,}/)
		.map((paragraph) => `<p>${paragraph.split('\n').map(lineOf).join('<br>')}</p>`);
	return `<!doctype html>\n<html lang="${escaped(language)}"><body>\n${paragraphs.join('\n')}\n</body></html>\n`;
}

/** The text between links is escaped, and so is each link, in its attribute and on the page. */
function lineOf(line: string): string {
	const links = line.match(LINK) ?? [];
	return line
		.split(LINK)
		.map((between, index) => {
			const link = links[index];
			const anchor = link === undefined ? '' : `<a href="${escaped(link)}">${escaped(link)}</a>`;
			return escaped(between) + anchor;
		})
		.join('');
}

function escaped(text: string): string {
	return text
		.replaceAll('&', '&amp;')
		.replaceAll('<', '&lt;')
		.replaceAll('>', '&gt;')
		.replaceAll('"', '&quot;');
}
