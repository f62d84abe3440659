import type { Component } from 'svelte';

/** A drawing of the icon library, by its own import, so that only those in use are shipped. */
export type IconDrawing = Component<{
	size?: number | string;
	strokeWidth?: number | string;
	'aria-hidden'?: 'true';
}>;
