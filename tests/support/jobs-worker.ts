import { serveJobs } from '../../server/jobs/serve.ts';
import { testJobs } from './test-jobs.ts';

serveJobs(testJobs);
