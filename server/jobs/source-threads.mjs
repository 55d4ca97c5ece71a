// Lets a thread load TypeScript. tsx does so by itself in the main thread only.
import {register} from 'tsx/esm/api';

register();
