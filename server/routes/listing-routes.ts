import { listingEndpoints } from '../../shared/contracts/listings.ts';
import { dayOf } from '../../shared/domain/days.ts';
import type { Api } from '../http/api.ts';
import { farmOf } from '../queries/farm.ts';
import { listListings } from '../queries/listings.ts';
import { createListing, editListing } from '../services/listing-service.ts';

/** What is offered to stores, and at which price. */
export function listingRoutes(api: Api): void {
  api.read(listingEndpoints.list, (db, { query }) =>
    listListings(db, query, dayOf(api.deps.clock.now(), farmOf(db).timeZone)),
  );
  api.write(listingEndpoints.create, (write, { body }) => createListing(write, body));
  api.write(listingEndpoints.edit, (write, { params, body, ifMatch }) => editListing(write, params.id, ifMatch, body));
}
