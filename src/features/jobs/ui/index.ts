export { JobPanel, type JobPanelProps } from './JobPanel';
export { stopJob, useJob } from './use-job';
