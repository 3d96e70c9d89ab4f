import { jobsOf } from '../server/jobs';
import { startJobs } from '../server/jobs/runner';
import { log } from '../server/log';
import { failToStart, onStopRequest, reportReady } from '../server/process/lifecycle';
import { closeServices, services } from '../server/services';

/** Entry of the background process: mail delivery, lapsing offers, tidying up. */
try {
  const stopJobs = startJobs(jobsOf(services()));
  onStopRequest(async () => {
    await stopJobs();
    await closeServices();
    log.info('worker stopped');
  });
  reportReady();
} catch (error) {
  failToStart(error);
}
