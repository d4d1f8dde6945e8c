# Turns the text tables of share/tables into const C arrays (src/job/table.h).
# A table file holds rows `name | value | ... | source`; "#" begins a comment line; "-" = not said.
# A value is a number, a number with mm, in, ml, l, MPa, d or /degF behind it, or a text column.
# Runs under any POSIX awk.
BEGIN {
    FS = "|"
    # columns: s text, n number
    shape["aggregates"] = "sns"; type["aggregates"] = "aggregate_row aggregate"
    shape["bases"] = "snnnns"; type["bases"] = "base_row base"
    shape["interlayers"] = "snnnns"; type["interlayers"] = "interlayer_row interlayer"
    shape["sealants"] = "snnnnnnnnnss"; type["sealants"] = "sealant_row sealant"
    shape["blades"] = "snss"; type["blades"] = "size_row blade"
    shape["rods"] = "snss"; type["rods"] = "size_row rod"
    shape["fillers"] = "snss"; type["fillers"] = "size_row filler"
    shape["seals"] = "snss"; type["seals"] = "size_row seal"
    shape["dowels"] = "snnnnns"; type["dowels"] = "dowel_row dowel"
    shape["practices"] = "ssnnnss"; type["practices"] = "practice_row practice"
    print "/* Made from share/tables by src/job/tables.awk: change the tables, not this file. */"
    print "#include \"job/table.h\""
    print "#include <math.h>"
}

function trim(text)
{
    sub(/^[ \t]+/, "", text)
    sub(/[ \t\r]+$/, "", text)
    return text
}

function fail(words)
{
    printf "%s:%d: %s\n", FILENAME, FNR, words > "/dev/stderr"
    failed = 1
    exit 1
}

function c_text(text)
{
    gsub(/\\/, "\\\\", text)
    gsub(/"/, "\\\"", text)
    return "\"" text "\""
}

# 1 1/4 -> (1 + 1.0 / 4.0), 3/8 -> (3.0 / 8.0)
function c_number(text, parts, fraction)
{
    if (text ~ /^-?[0-9]*\.?[0-9]+([eE][-+]?[0-9]+)?$/)
        return text
    if (text ~ /^[0-9]+\/[0-9]+$/) {
        split(text, fraction, "/")
        return "(" fraction[1] ".0 / " fraction[2] ".0)"
    }
    if (text ~ /^[0-9]+ [0-9]+\/[0-9]+$/) {
        split(text, parts, " ")
        split(parts[2], fraction, "/")
        return "(" parts[1] " + " fraction[1] ".0 / " fraction[2] ".0)"
    }
    fail("not a number: " text)
}

function c_value(text, unit)
{
    if (text == "-")
        return "NAN"
    if (match(text, / (mm|in|ml|l|MPa|d|\/degF|degC)$/)) {
        unit = substr(text, RSTART + 1)
        text = trim(substr(text, 1, RSTART))
    }
    text = c_number(text)
    if (unit == "mm")
        return text " / 1000.0"
    if (unit == "in")
        return text " * 25.4 / 1000"
    if (unit == "ml")
        return text " / 1e6"
    if (unit == "l")
        return text " / 1000.0"
    if (unit == "MPa")
        return text " * 1e6"
    if (unit == "/degF")
        return text " * 9 / 5"
    return text
}

function finish()
{
    if (table == "")
        return
    printf "};\nconst size_t %s_count = sizeof %s_table / sizeof *%s_table;\n", short, short, short
}

function start(words)
{
    finish()
    table = FILENAME
    sub(/^.*\//, "", table)
    sub(/\.txt$/, "", table)
    if (!(table in shape))
        fail("no such table: " table)
    split(type[table], words, " ")
    short = words[2]
    printf "\nconst struct %s %s_table[] = {\n", words[1], short
}

FNR == 1 { start() }
/^[ \t]*(#|$)/ { next }
{
    if (NF != length(shape[table]))
        fail(NF " columns, not " length(shape[table]))
    row = ""
    for (i = 1; i <= NF; i++) {
        cell = trim($i)
        if (cell == "")
            fail("column " i " is empty; write - when nothing is said")
        if (substr(shape[table], i, 1) == "s")
            cell = c_text(cell)
        else
            cell = c_value(cell)
        row = row (i > 1 ? ", " : "") cell
    }
    print "    {" row "},"
}
END {
    if (!failed)
        finish()
}
