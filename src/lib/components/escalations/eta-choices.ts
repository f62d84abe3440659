/** The minutes that are one tap away. */
export const ETA_CHOICES = [1, 2, 5, 10, 20].map((minutes) => ({
	value: `${minutes}`,
	label: `${minutes}`
}));
