export { AccountPage as Component } from '@/features/account/components/account-page';
