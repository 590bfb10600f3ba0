import { analyseLogJob } from './jobs/analyse-log.ts'
import { calculateDistributionJob } from './jobs/calculate-distribution.ts'
import { cutClipJob } from './jobs/cut-clip.ts'
import { fingerprintReferenceJob } from './jobs/fingerprint-reference.ts'
import { bindJob } from './jobs/job-context.ts'
import type { JobHandlers } from './jobs/job-runner.ts'
import { renderStatementsJob } from './jobs/render-statements.ts'
import { sendMailJob } from './jobs/send-mail.ts'

/** Every kind of job and who does it; a kind without a handler does not compile. */
export const jobHandlers: JobHandlers = {
  'analyse-log': bindJob('analyse-log', analyseLogJob),
  'calculate-distribution': bindJob('calculate-distribution', calculateDistributionJob),
  'cut-clip': bindJob('cut-clip', cutClipJob),
  'fingerprint-reference': bindJob('fingerprint-reference', fingerprintReferenceJob),
  'render-statements': bindJob('render-statements', renderStatementsJob),
  'send-mail': bindJob('send-mail', sendMailJob),
}
