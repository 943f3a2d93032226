export { MailPage as Component } from '@/features/people/components/mail-page';
