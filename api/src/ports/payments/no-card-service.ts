import { CardService } from './card-service.js';

/** Stands where no card service is set up: homeowners pay in other ways. */
export class NoCardService extends CardService {
  readonly offered = false;

  createCheckout(): never {
    throw notSetUp();
  }

  retrieveCheckout(): never {
    throw notSetUp();
  }

  expireCheckout(): never {
    throw notSetUp();
  }

  refund(): never {
    throw notSetUp();
  }

  retrieveRefund(): never {
    throw notSetUp();
  }

  readEvent(): never {
    throw notSetUp();
  }
}

const notSetUp = () => new Error('No card service is set up: STRIPE_SECRET_KEY is not there.');
