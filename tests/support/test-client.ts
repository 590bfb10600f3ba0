export {
  DeskClient as TestClient,
  type Answer,
  type CallParts,
  type JsonEndpoint,
} from '../../seeds/demo/desk-client.ts'
