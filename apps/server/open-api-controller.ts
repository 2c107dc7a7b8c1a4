import { Controller, Get } from '@nestjs/common';
import { OpenApi } from './open-api.js';
import { Public } from './public.js';

/** The API's own description. */
@Controller('api/openapi.json')
export class OpenApiController {
  constructor(private readonly openApi: OpenApi) {}

  @Get()
  @Public('Gives this description.')
  describe() {
    return this.openApi.document();
  }
}
