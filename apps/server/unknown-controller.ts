import { All, Controller, NotFoundException } from '@nestjs/common';
import { Public } from './public.js';

/** What no other controller serves under /api is an error in JSON, never a page. */
@Controller('api')
export class UnknownController {
  @All('*')
  @Public('Answers what does not exist.')
  refuse(): never {
    throw new NotFoundException('there is nothing at this address');
  }
}
