import { Person } from '../people/person.entity';
import { PersonRole } from '../people/person-role.entity';

/** Every entity of the server; migrations must describe exactly these. */
export const entities = [Person, PersonRole];
