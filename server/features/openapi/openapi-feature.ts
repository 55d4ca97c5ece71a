import {readOpenApi} from '#shared/openapi/openapi';
import {type Feature} from '../../feature';
import {mount} from '../../http/mount';
import {mountedOn} from '../../http/mounted';
import {describeApi} from './describe-api';

export const openapiFeature: Feature = {
  mount(router, {config}) {
    let description: Promise<Record<string, unknown>> | undefined; // the same until the next build
    mount(router, readOpenApi, () => {
      const endpoints = mountedOn(router).flatMap(({endpoint}) => endpoint ?? []);
      description ??= Promise.resolve(describeApi(endpoints, config.build));
      return description;
    });
  },
};
