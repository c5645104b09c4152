import { describeDemo } from '../../services/demo/describe-demo'

export default publicRoute('GET /api/demo', { handle: ({ services }) => describeDemo(services) })
