/** What nobody at the bedside needs before they have done something: fetched apart by `later`. */
export { default as PrecautionList } from '$lib/components/patient/PrecautionList.svelte';
export { default as Saved } from './Saved.svelte';
export { default as WalkFigures } from './WalkFigures.svelte';
