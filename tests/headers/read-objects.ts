import { SeriesCollector } from '../../src/headers/series-collector.js';
import { objectHeaders } from '../../src/store/dicom/object-headers.js';
import { parseObject } from '../../src/store/dicom/parse-object.js';

/** The headers of whole objects, collected; throws where one is not read, since the tests mean it to be. */
export function collectObjects(objects: Iterable<Buffer>): SeriesCollector {
  const collector = new SeriesCollector();
  for (const bytes of objects) {
    const parsed = parseObject(bytes, true);
    if (parsed.kind !== 'parsed') throw new Error(`not read: ${JSON.stringify(parsed)}`);
    const headers = objectHeaders(parsed, (uid) => uid);
    if (headers === null) throw new Error('no MR image');
    for (const header of headers) collector.add(header);
  }
  return collector;
}
