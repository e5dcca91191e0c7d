import { defineEventHandler } from 'h3'
import { Failure } from '~/server/utils/fail'
import { refusal } from '~/server/utils/route'

/** Whatever no other file answers to. */
export default defineEventHandler((event) => refusal(event, new Failure(404, 'There is nothing here.')))
