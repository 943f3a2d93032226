export { JobsPage as Component } from '@/features/people/components/jobs-page';
