"""Lists come in pages, always; a client may ask for shorter or longer ones up to a cap."""

from rest_framework.pagination import PageNumberPagination


class Pages(PageNumberPagination):
    page_size = 50
    page_size_query_param = "page_size"
    max_page_size = 500
