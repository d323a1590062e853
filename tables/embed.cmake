# Both the function and the script it runs. Bytes go out as a hex array, exact for any content; touching one table
# rebuilds that one file only.
#   turnwright_embed(TARGET name table.csv ...)   and, as a script:   cmake -DIN=... -DOUT=... -DNAME=... -P embed.cmake
if(CMAKE_SCRIPT_MODE_FILE)
  file(READ "${IN}" bytes HEX)
  string(LENGTH "${bytes}" digits)
  math(EXPR size "${digits} / 2")
  string(REGEX REPLACE "(..)" "0x\\1," bytes "${bytes}")
  file(WRITE "${OUT}" "#include <cstddef>\nextern const unsigned char turnwright_table_${NAME}[];\n"
    "extern const std::size_t turnwright_table_${NAME}_size;\n"
    "const unsigned char turnwright_table_${NAME}[] = {${bytes}0};\n"
    "const std::size_t turnwright_table_${NAME}_size = ${size};\n")
  return()
endif()

set(turnwright_embed_script "${CMAKE_CURRENT_LIST_FILE}")

function(turnwright_embed target)
  set(sources "")
  set(declarations "")
  set(entries "")
  foreach(table IN LISTS ARGN)
    get_filename_component(name "${table}" NAME_WE)
    set(out "${CMAKE_CURRENT_BINARY_DIR}/${name}.cpp")
    add_custom_command(OUTPUT "${out}"
      COMMAND ${CMAKE_COMMAND} -DIN=${CMAKE_CURRENT_SOURCE_DIR}/${table} -DOUT=${out} -DNAME=${name} -P "${turnwright_embed_script}"
      DEPENDS "${CMAKE_CURRENT_SOURCE_DIR}/${table}" "${turnwright_embed_script}" VERBATIM)
    list(APPEND sources "${out}")
    string(APPEND declarations "extern const unsigned char turnwright_table_${name}[];\nextern const std::size_t turnwright_table_${name}_size;\n")
    string(APPEND entries "TURNWRIGHT_TABLE(${name})\n")
  endforeach()
  file(CONFIGURE OUTPUT "${CMAKE_CURRENT_BINARY_DIR}/include/turnwright_tables.inc" CONTENT "${entries}")
  file(CONFIGURE OUTPUT "${CMAKE_CURRENT_BINARY_DIR}/include/turnwright_table_arrays.inc" CONTENT "${declarations}")
  add_library(${target} OBJECT ${sources})
  target_include_directories(${target} INTERFACE "${CMAKE_CURRENT_BINARY_DIR}/include")
endfunction()
