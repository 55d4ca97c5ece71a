import {readHealth, readReadiness} from '#shared/health/health';
import {isMigrated} from '../../db/is-migrated';
import {type Feature} from '../../feature';
import {mountPublic} from '../../http/mount';

export const healthFeature: Feature = {
  mount(router, {config, db}) {
    const {build} = config;
    mountPublic(router, readHealth, () => Promise.resolve({status: 'up' as const, build}));
    mountPublic(router, readReadiness, async (input, {res}) => {
      const isReady = await isMigrated(db);
      if (!isReady) res.status(503);
      return {status: isReady ? ('ready' as const) : ('not-ready' as const), build};
    });
  },
};
