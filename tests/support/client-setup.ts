import { buildClient } from '../../server/scripts/build-client.ts';

/** The browser tests look at the built client, as people do. */
export default function setUp(): void {
  buildClient();
}
