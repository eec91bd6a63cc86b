import { Inject } from '@nestjs/common';
import type { ApiEnvironment } from '@masswright/config';

/** The api's parsed environment. */
export type ApiSettings = ApiEnvironment;
const apiSettings = Symbol('api settings');
export const apiSettingsProvider = (settings: ApiSettings) => ({ provide: apiSettings, useValue: settings });
export const InjectApiSettings = () => Inject(apiSettings);
