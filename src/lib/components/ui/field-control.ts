/** What a control needs in order to belong to its label, hint and error. */
export type FieldControl = {
	id: string;
	required: boolean;
	'aria-describedby': string | undefined;
	'aria-invalid': 'true' | undefined;
};
