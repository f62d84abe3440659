/** Figures that an ask names in its words, such as `2.5 km/h`: whoever decides must not pass over them unseen. */

/** How much and of what: what a clearance can be limited in. A day, an age and a grade of exertion are none. */
const FIGURE =
	/\b\d+(?:[.,]\d+)?\s*(?:km\/h|kmh|kph|mph|m\/min|m\/s|%|°|degrees?|deg\b|minutes?\b|mins?\b|ml\b|cm\b|kg\b|kilos?\b|watts?\b|w\b|mets?\b|metres?\b|meters?\b|m\b|steps?\b|flights?\b)/giu;

/**
 * @param words what was asked, as a person wrote it
 * @returns each figure with its unit as it was written, in order and once each; empty where none is named
 */
export function figuresIn(words: string): string[] {
	return [...new Set([...words.matchAll(FIGURE)].map(([figure]) => figure.replace(/\s+/g, ' ')))];
}
