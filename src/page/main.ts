/** The script of a page. */
import { startTrace } from './trace.ts'

startTrace()
