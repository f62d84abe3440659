/** Close a switch over a union: a new member fails to compile, and an impossible value throws. */
export function assertNever(value: never): never {
	throw new Error(`Unhandled value ${JSON.stringify(value)}: a switch forgot a member of its union.`);
}
