export { StimuliPage as Component } from '@/features/stimuli/components/stimuli-page';
