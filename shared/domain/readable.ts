import type { ProductionFile } from '../contracts/resources';
import { fileOf, rowsOf } from './changes';
import { type Reader, readableFields } from './policy';

/** A whole production as one reader may see it: rows and fields that are not theirs are left out. The file given is not changed. */
export function readableFile(reader: Reader, file: ProductionFile): ProductionFile {
  return fileOf(
    rowsOf(file).flatMap((row, position) => {
      const fields = readableFields(reader, row.resource, row.key, row.fields);
      return fields === null ? [] : [{ ...row, fields, position, revision: 0, removed: false }];
    }),
  );
}
