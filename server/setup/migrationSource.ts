import { join } from 'node:path'
import { createDataSource } from '../data-source.ts'

/**
 * For TypeORM's command line, which wants a data source as an export: the database in DATA_DIR, whose schema a new
 * migration is compared with. Bring it up to date first, by starting the server once.
 */
export default createDataSource(join(process.env.DATA_DIR ?? 'var', 'tessellary.sqlite'))
