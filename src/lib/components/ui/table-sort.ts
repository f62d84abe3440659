/** By which column a table is sorted, and which way. */
export type Sort = { by: string; direction: 'ascending' | 'descending' };

/** What pressing a column's heading does: the column upwards first, then downwards, then upwards again. */
export function nextSort(sort: Sort | null, column: string): Sort {
	const again = sort?.by === column && sort.direction === 'ascending';
	return { by: column, direction: again ? 'descending' : 'ascending' };
}
