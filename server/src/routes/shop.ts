import * as questions from '@foldwright/shared/contracts/questions';
import * as contracts from '@foldwright/shared/contracts/shop';
import * as storefront from '@foldwright/shared/contracts/storefront';
import type { AppDependencies } from '../app-dependencies';
import type { BoundRoute } from '../http/route-call';
import { bind } from '../http/route-call';
import { placeSale } from '../services/sales/place-sale';
import { addListingPhoto, readShopPhoto, removeListingPhoto } from '../services/shop/listing-photos';
import { changeListing, createListing, listListings, readListing, setListingState } from '../services/shop/listings';
import { priceCart } from '../services/shop/offer';
import { answerQuestion, askMore, askShop, listQuestions, readQuestion } from '../services/shop/questions';
import { changeShopSettings, readShopSettings } from '../services/shop/settings';
import { readShop, readShopFront, readShopListing, searchShop } from '../services/shop/storefront';

/** What the workshop decides about its shop. */
export function shopRoutes(dependencies: AppDependencies): BoundRoute[] {
  const { database, now } = dependencies;
  return [
    bind(contracts.readShopSettings, ({ actor }) => readShopSettings(database, actor)),
    bind(contracts.changeShopSettings, ({ actor, body, ifMatch }) =>
      changeShopSettings(database, actor, body, ifMatch),
    ),
    bind(contracts.listListings, async ({ actor }) => ({ listings: await listListings(database, actor) })),
    bind(contracts.createListing, ({ actor, body, idempotencyKey }) =>
      createListing(database, actor, body, idempotencyKey, now()),
    ),
    bind(contracts.readListing, ({ actor, params }) => readListing(database, actor, params.listingId)),
    bind(contracts.changeListing, ({ actor, params, body, ifMatch }) =>
      changeListing(database, actor, params.listingId, body, ifMatch),
    ),
    bind(contracts.setListingState, ({ actor, params, body, ifMatch }) =>
      setListingState(database, actor, params.listingId, body.state, ifMatch),
    ),
    bind(contracts.addListingPhoto, ({ actor, params, body, upload }) =>
      addListingPhoto(dependencies, actor, params.listingId, upload, body.description),
    ),
    bind(contracts.removeListingPhoto, ({ actor, params }) =>
      removeListingPhoto(dependencies, actor, params.listingId, params.listingPhotoId),
    ),
    bind(questions.listQuestions, async ({ actor }) => ({ questions: await listQuestions(database, actor) })),
    bind(questions.answerQuestion, ({ actor, params, body, idempotencyKey }) =>
      answerQuestion(dependencies, actor, params.questionId, body.text, idempotencyKey),
    ),
  ];
}

/** What customers do before they have an order. */
export function storefrontRoutes(dependencies: AppDependencies): BoundRoute[] {
  const { database, limits } = dependencies;
  return [
    bind(storefront.readShop, ({ params }) => readShop(database, params.shop)),
    bind(storefront.searchShop, async ({ params, query }) => ({
      cards: await searchShop(database, params.shop, query),
    })),
    bind(storefront.readShopListing, ({ params }) => readShopListing(database, params.shop, params.listing)),
    bind(storefront.readShopPhoto, ({ params }) => readShopPhoto(dependencies, params.shop, params.photoId)),
    bind(storefront.priceCart, ({ params, body }) => priceCart(database, params.shop, body.lines)),
    bind(storefront.placeSale, async ({ actor, params, body, idempotencyKey, request }) => {
      await limits.countVisitorPost(request);
      return placeSale(dependencies, actor, params.shop, body, idempotencyKey);
    }),
    bind(questions.askShop, async ({ params, body, idempotencyKey, request }) => {
      await limits.countVisitorPost(request);
      return { link: await askShop(dependencies, params.shop, body, idempotencyKey) };
    }),
    bind(questions.readQuestionByLink, async ({ params }) => {
      const { workshopId, question } = await readQuestion(database, params.link);
      return { shop: await readShopFront(database, workshopId), question };
    }),
    bind(questions.askMoreByLink, async ({ params, body, idempotencyKey, request }) => {
      await limits.countVisitorPost(request);
      return askMore(dependencies, params.link, body.text, idempotencyKey);
    }),
  ];
}
