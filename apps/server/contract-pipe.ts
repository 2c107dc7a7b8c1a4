import type { ArgumentMetadata, PipeTransform } from '@nestjs/common';
import { readBySchema } from '#libs/contract/schema-problems.js';

/** Reads a body by the schema its parameter names: every problem with its path, unknown keys refused. */
export class ContractPipe implements PipeTransform {
  transform(value: unknown, metadata: ArgumentMetadata): unknown {
    const schema = (metadata as { schema?: Parameters<typeof readBySchema>[0] }).schema;
    if (schema === undefined) throw new Error(`no schema for the ${metadata.type}`);
    return readBySchema(schema, value ?? {});
  }
}
