import { EmailField, NewPasswordField, TokenField } from '../dto/credentials.fields';

export class AskPasswordResetDto {
  @EmailField()
  email!: string;
}

export class CompletePasswordResetDto {
  @TokenField()
  token!: string;

  @NewPasswordField()
  password!: string;
}
