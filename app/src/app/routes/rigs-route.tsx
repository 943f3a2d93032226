export { RigsPage as Component } from '@/features/rigs/components/rigs-page';
