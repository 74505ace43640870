import { filterChoices } from '../services/readings/filter-choices'

/** What the results browser can be filtered by: shops, instruments, recent batches. */
export default apiHandler(async event => filterChoices(await requireMember(event, 'readings.see')))
