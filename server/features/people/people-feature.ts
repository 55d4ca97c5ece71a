import {type Feature} from '../../feature';
import {OrganisationEntity} from './organisation-entity';
import {PersonEntity} from './person-entity';

export const peopleFeature: Feature = {entities: [OrganisationEntity, PersonEntity]};
