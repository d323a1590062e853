# turnwright_layer(NAME HEADERS ... SOURCES ... NEEDS layer ... USES target ...)
#
# One folder, one library, one namespace. NEEDS may only name layers declared above; USES are outside libraries, which
# stay private to the layer's sources. Each layer has an include root of its own in the build tree, so that reaching
# for a header of a layer that is not in NEEDS is a "no such file" error.
function(turnwright_layer name)
  cmake_parse_arguments(layer "" "" "HEADERS;SOURCES;NEEDS;USES" ${ARGN})
  set(root "${PROJECT_BINARY_DIR}/roots/${name}")
  file(MAKE_DIRECTORY "${root}/turnwright")
  file(CREATE_LINK "${CMAKE_CURRENT_SOURCE_DIR}/${name}" "${root}/turnwright/${name}" SYMBOLIC)

  list(TRANSFORM layer_SOURCES PREPEND "${name}/")
  list(TRANSFORM layer_HEADERS PREPEND "${root}/turnwright/${name}/")
  add_library(turnwright_${name} STATIC ${layer_SOURCES})
  add_library(turnwright::${name} ALIAS turnwright_${name})
  set_target_properties(turnwright_${name} PROPERTIES EXPORT_NAME ${name} VERIFY_INTERFACE_HEADER_SETS ON)
  target_sources(turnwright_${name} PUBLIC FILE_SET HEADERS BASE_DIRS "${root}" FILES ${layer_HEADERS})
  target_compile_features(turnwright_${name} PUBLIC cxx_std_20)

  foreach(need IN LISTS layer_NEEDS)
    if(NOT TARGET turnwright_${need})
      message(FATAL_ERROR "layer '${name}' leans on '${need}', which is not declared above it: a layer may only lean on those above")
    endif()
    target_link_libraries(turnwright_${name} PUBLIC turnwright_${need})
  endforeach()
  foreach(use IN LISTS layer_USES)
    target_link_libraries(turnwright_${name} PRIVATE $<BUILD_INTERFACE:${use}>)
  endforeach()
  target_link_libraries(turnwright INTERFACE turnwright_${name})
  install(TARGETS turnwright_${name} EXPORT turnwright FILE_SET HEADERS)
endfunction()
