-- Markdown and TeX to Typst, for one whole package in one run of pandoc.
--
-- Reads JSON on standard input:  {"nonce": text, "cells": [markdown], "formulas": [TeX]}
-- Writes JSON on standard output: {"cells": [{"markup", "images", "headings", "problems"}],
--                                  "formulas": [markup], "problems": {"index": text}}
-- Every cell is read alone and without access to any file, so that nothing left open in one cell
-- can swallow the next.

local READ = {
  format = "commonmark",
  extensions = {
    autolink_bare_uris = true, pipe_tables = true, raw_html = true,
    strikeout = true, task_lists = true, tex_math_dollars = true,
  },
}
local SCHEMES = { http = true, https = true, mailto = true }

-- What pandoc warned of, each as one line of text.
local function warnings(log)
  local lines = pandoc.List {}
  for _, message in ipairs(log) do
    -- A message shows its fields only as JSON.
    local fields = pandoc.json.decode(pandoc.json.encode(message), false)
    if fields.verbosity == "WARNING" then
      lines:insert((fields.pretty:gsub("%s+", " "):gsub(", rendering as TeX.*", "")))
    end
  end
  return lines
end

-- A call of a function of the template, in place of what stood there.
local function call(name, argument)
  return pandoc.RawInline("typst", "#" .. name .. "(" .. argument .. ");")
end

local function scheme(target)
  return (target:match("^%s*([%a][%w+.-]*):") or ""):lower()
end

-- Formulas go through the template, which breaks those that are wider than the page.
local function wrapped(math)
  local name = math.mathtype == "InlineMath" and "inline-formula" or "display-formula"
  return { pandoc.RawInline("typst", "#" .. name .. "["), math, pandoc.RawInline("typst", "];") }
end

-- Tables stand at the left like everything else; pandoc would centre them.
local function left_table(found)
  local written = pandoc.write(pandoc.Pandoc { found }, "typst")
  return pandoc.RawBlock("typst", (written:gsub("^#figure%(%s*align%(center%)", "#figure(align(left)", 1)))
end

local function cell(markdown)
  local images, headings, problems = {}, {}, {}
  local log, markup = pandoc.log.silence(function()
    local read = pandoc.read(markdown, READ, nil, {})
    read = read:walk {
      RawInline = function(raw)
        if raw.text:match("^<!%-%-") then return {} end
        if raw.text:match("^<[bB][rR]%s*/?>$") then return pandoc.LineBreak() end
        return pandoc.Str(raw.text)
      end,
      RawBlock = function(raw)
        if raw.text:match("^%s*<!%-%-") then return {} end
        return pandoc.Para { pandoc.Str(raw.text) }
      end,
      Link = function(link)
        if SCHEMES[scheme(link.target)] then
          return pandoc.Link(link.content, link.target)
        end
        return link.content
      end,
      Str = function(str)
        if str.text:find("\\begin{", 1, true) then
          problems[#problems + 1] = str.text .. " stands outside mathematics; put $$ round it"
        end
      end,
    }
    -- After the walk above, so that what this one writes is not read as raw text of the cell.
    read = read:walk {
      Image = function(image)
        images[#images + 1] = { source = image.src, alt = pandoc.utils.stringify(image.caption) }
        return call("picture", tostring(#images - 1))
      end,
      Header = function(header)
        headings[#headings + 1] =
          { level = header.level, text = pandoc.utils.stringify(header.content) }
        return pandoc.Header(header.level, header.content)
      end,
    }
    read = read:walk { Math = wrapped, Table = left_table }
    return pandoc.write(read, "typst")
  end)
  for _, line in ipairs(warnings(log)) do problems[#problems + 1] = line end
  return { markup = markup, images = pandoc.List(images), headings = pandoc.List(headings),
           problems = pandoc.List(problems) }
end

local function formula(tex)
  return pandoc.Plain { pandoc.Math("InlineMath", tex) }
end

-- Writing each formula as a document of its own costs three times as much as writing them all as
-- one, parted by a line that none of them can hold.
local function formulas(list, nonce)
  local blocks = {}
  for _, tex in ipairs(list) do
    blocks[#blocks + 1] = formula(tex)
    blocks[#blocks + 1] = pandoc.RawBlock("typst", nonce)
  end
  local written, problems = {}, {}
  local log, all = pandoc.log.silence(function()
    return pandoc.write(pandoc.Pandoc(blocks), "typst", { wrap_text = "none" })
  end)
  local from = 1
  while true do
    local first, last = all:find(nonce, from, true)
    if not first then break end
    written[#written + 1] = all:sub(from, first - 1)
    from = last + 1
  end
  if #log > 0 then
    for index, tex in ipairs(list) do
      local own = warnings(pandoc.log.silence(function()
        return pandoc.write(pandoc.Pandoc { formula(tex) }, "typst")
      end))
      if #own > 0 then problems[tostring(index - 1)] = own[1] end
    end
  end
  return written, problems
end

local input = pandoc.json.decode(io.read("a"), false)
local cells = pandoc.List {}
for _, markdown in ipairs(input.cells) do cells:insert(cell(markdown)) end
local written, problems = formulas(input.formulas, input.nonce)
io.write(pandoc.json.encode {
  cells = cells, formulas = pandoc.List(written), problems = problems,
})
