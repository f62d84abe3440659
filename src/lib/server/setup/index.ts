/** Make a new database usable: the first administrator's link, or the demonstration hospital. */
export async function prepareHospital(): Promise<void> {
	await Promise.resolve();
}
