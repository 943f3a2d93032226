export { PeoplePage as Component } from '@/features/people/components/people-page';
