import { EmailField, NewPasswordField, TokenField } from '../../auth/dto/credentials.fields';
import { NameField } from '../../common/dto-rules';

export class SetupDto {
  @TokenField()
  secret!: string;

  @NameField(80)
  benchName!: string;

  @NameField(80)
  displayName!: string;

  @EmailField()
  email!: string;

  @NewPasswordField()
  password!: string;
}
