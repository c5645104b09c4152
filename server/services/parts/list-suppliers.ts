import { asc, eq } from 'drizzle-orm'
import { partSuppliers, parts } from '../../database/schema/parts'
import { suppliers } from '../../database/schema/people'
import type { Context } from '../context'

/** Suppliers with the parts that each delivers, for the receiving form. */
export function listSuppliers(context: Context) {
  const delivered = context.db.select({ supplierId: partSuppliers.supplierId, number: parts.number, name: parts.name, unitPrice: partSuppliers.unitPrice }).from(partSuppliers).innerJoin(parts, eq(parts.id, partSuppliers.partId)).orderBy(asc(parts.number)).all()
  return context.db.select().from(suppliers).orderBy(asc(suppliers.name)).all()
    .map(supplier => ({ code: supplier.code, name: supplier.name, parts: delivered.filter(row => row.supplierId === supplier.id).map(({ number, name, unitPrice }) => ({ number, name, unitPrice })) }))
}
