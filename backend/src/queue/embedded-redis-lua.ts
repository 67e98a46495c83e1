/**
 * Bull's scripts are written for the Lua 5.1 inside a Redis server. The in-memory stand-in runs them on a Lua 5.3
 * whose values come from JavaScript. The text below is put around each script and closes the differences; the
 * script itself stays as Bull ships it.
 */

/**
 * Reads JSON in Lua. Redis offers scripts two decoders, `cjson` for JSON and `cmsgpack` for MessagePack. MessagePack
 * arguments are turned into JSON on the JavaScript side, so that one decoder serves both names. A `null` inside an
 * object is an absent key, as with the real decoders' nil; Bull stores no arrays with gaps.
 */
const DECODERS = String.raw`
local function decodeJson(text)
  local at = 1
  local escapes = { b = '\b', f = '\f', n = '\n', r = '\r', t = '\t' }
  local readValue

  local function skipSpace()
    at = text:find('%S', at) or #text + 1
  end

  local function readString()
    local pieces = {}
    at = at + 1
    while true do
      local stop = text:find('["\\]', at)
      if not stop then error('JSON text ends inside a string') end
      pieces[#pieces + 1] = text:sub(at, stop - 1)
      if text:sub(stop, stop) == '"' then
        at = stop + 1
        return table.concat(pieces)
      end
      local letter = text:sub(stop + 1, stop + 1)
      if letter == 'u' then
        local code = tonumber(text:sub(stop + 2, stop + 5), 16)
        at = stop + 6
        if code >= 0xD800 and code < 0xDC00 and text:sub(at, at + 1) == '\\u' then
          local low = tonumber(text:sub(at + 2, at + 5), 16)
          code = 0x10000 + (code - 0xD800) * 0x400 + (low - 0xDC00)
          at = at + 6
        end
        pieces[#pieces + 1] = utf8.char(code)
      else
        pieces[#pieces + 1] = escapes[letter] or letter
        at = stop + 2
      end
    end
  end

  local function readMembers(close, readMember)
    at = at + 1
    skipSpace()
    if text:sub(at, at) == close then
      at = at + 1
      return
    end
    while true do
      readMember()
      skipSpace()
      local mark = text:sub(at, at)
      at = at + 1
      if mark == close then return end
      if mark ~= ',' then error('JSON text is broken at byte ' .. at) end
    end
  end

  readValue = function()
    skipSpace()
    local first = text:sub(at, at)
    if first == '"' then return readString() end
    if first == '{' then
      local object = {}
      readMembers('}', function()
        skipSpace()
        local key = readString()
        skipSpace()
        if text:sub(at, at) ~= ':' then error('JSON text is broken at byte ' .. at) end
        at = at + 1
        object[key] = readValue()
      end)
      return object
    end
    if first == '[' then
      local list = {}
      readMembers(']', function() list[#list + 1] = readValue() end)
      return list
    end
    for word, value in pairs({ ['true'] = true, ['false'] = false }) do
      if text:sub(at, at + #word - 1) == word then
        at = at + #word
        return value
      end
    end
    if text:sub(at, at + 3) == 'null' then
      at = at + 4
      return nil
    end
    local from, to = text:find('^-?[%d.eE+-]+', at)
    if not from then error('JSON text is broken at byte ' .. at) end
    at = to + 1
    return tonumber(text:sub(from, to))
  end

  return readValue()
end
local cjson = { decode = decodeJson }
local cmsgpack = { unpack = decodeJson }
`;

/**
 * What every script gets.
 *
 * Numbers: Lua 5.3 tells 1 from 1.0, and whatever comes from JavaScript is the latter. A job number glued into a key
 * would read `bull:queue:1.0`. So whole numbers are made integers wherever one enters (replies, `tonumber`) and
 * written without a fraction wherever one leaves (arguments).
 *
 * Replies: an absent value is `false` in Redis, but a JavaScript `null` here; a list is a JavaScript object and not a
 * table, so `#list` and `unpack(list)` would fail.
 *
 * Results: Redis cuts numbers to integers, turns `true` into 1, and ends a list at its first nil. The stand-in knows a
 * list only by its keys coming out of the table in falling order, hence the filling from the end.
 */
const BRIDGE = String.raw`
local luaTonumber = tonumber
local function tonumber(value, base)
  if base then return luaTonumber(value, base) end
  local number = luaTonumber(value)
  if number == nil then return nil end
  return math.tointeger(number) or number
end

-- Dropped from the language after 5.2; Bull masks counters with it.
local bit = {
  band = function(a, b) return math.tointeger(a) & math.tointeger(b) end,
  bor = function(a, b) return math.tointeger(a) | math.tointeger(b) end,
}

local function asArgument(value)
  if type(value) ~= 'number' then return value end
  local whole = math.tointeger(value)
  if whole then return string.format('%d', whole) end
  return string.format('%.17g', value)
end

local function asReply(value)
  if value == nil then return false end
  if type(value) == 'number' then return math.tointeger(value) or value end
  if type(value) ~= 'userdata' then return value end
  local name = tostring(value)
  if name == 'null' or name == 'undefined' then return false end
  local list = {}
  for index = 1, #value do list[index] = asReply(value[index]) end
  return list
end

local function asResult(value)
  if value == nil then return false end
  if value == true then return 1 end
  if type(value) == 'number' then return math.tointeger(value) or math.floor(value) end
  if type(value) ~= 'table' then return value end
  local length = 0
  while value[length + 1] ~= nil do length = length + 1 end
  local list = {}
  for index = length, 1, -1 do list[index] = asResult(value[index]) end
  return list
end

local plainCall = redis.call
local function call(...)
  local arguments = table.pack(...)
  for index = 1, arguments.n do arguments[index] = asArgument(arguments[index]) end
  return asReply(plainCall(table.unpack(arguments, 1, arguments.n)))
end
local redis = { call = call, pcall = call }
`;

/** The script with everything it expects from a Redis server around it. */
export function bridgeScript(lua: string): string {
  // The decoders cost parsing time on each call, and few scripts use them.
  const decoders = /\b(cmsgpack|cjson)\b/.test(lua) ? DECODERS : '';
  return `${BRIDGE}${decoders}\nlocal function script()\n${lua}\nend\nreturn asResult(script())`;
}
