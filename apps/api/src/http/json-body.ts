import express, { type Request, type RequestHandler, type Response } from 'express'

const parseJson: RequestHandler = express.json({ limit: '1mb' })

/** Reads a JSON body once it is known who asks. The error middleware puts what fails into words. */
export async function readJsonBody(request: Request, response: Response): Promise<void> {
  await new Promise<void>((resolve, reject) => {
    parseJson(request, response, (error?: unknown) => {
      if (error === undefined) resolve()
      else reject(error instanceof Error ? error : new Error('The body could not be read', { cause: error }))
    })
  })
}
